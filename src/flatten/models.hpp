// .model cards -> device models with plain numbers, made once for all elements that mean the same numbers.
#pragma once

#include "flatten/values.hpp"

namespace flatten {

class Models {
 public:
  Models(Work& work, Values& values) : work_(work), values_(values) {}

  // The device model of a card, for the elements of a frame. Parameters that are left out are noted once.
  const UsableModel& use(const Frame& frame, const FoundModel& found);

  // The frame among a frame and its callers that has the parameters of a scope around it.
  [[nodiscard]] static const Frame& owner(const Frame& frame, model::ScopeId scope);

  // Whether a card's type is one that elements may use: a device with a whitelist, or R, C, L.
  [[nodiscard]] bool is_known(const model::ModelCard& card) const;

  // The parameter of a model that has this name, or none.
  [[nodiscard]] const model::Assignment* entry(const model::ModelCard& card, std::string_view name) const;

 private:
  UsableModel make(const Frame& frame, const model::ModelCard& card);
  [[nodiscard]] bool only_literals(const model::ModelCard& card) const;
  int level_of(const Frame& frame, const model::ModelCard& card);
  bool add(const Frame& frame, const model::ModelCard& card, const model::Assignment& entry, UsableModel& model,
           model::DeviceModel& made);
  void say_left_out(const Frame& frame, const model::ModelCard& card, const std::vector<base::NameId>& names);

  Work& work_;
  Values& values_;
};

}  // namespace flatten
