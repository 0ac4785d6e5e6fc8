// Element cards -> elements of the flat circuit, with their nets, values and fates.
#pragma once

#include <optional>
#include <string_view>
#include <vector>

#include "flatten/models.hpp"

namespace flatten {

class Elements {
 public:
  Elements(Work& work, Parameters& parameters, Values& values, Models& models);

  // Adds the element of a card that is no instance. Controlled and behavioural sources get their part in finish(),
  // since they may name what stands behind them.
  void add(const Frame& frame, const model::ElementCard& card);

  // How many sources wait for finish().
  [[nodiscard]] std::size_t waiting() const { return waiting_.size(); }

  // Gives the sources of a frame their parts: those that wait, but for the first `older`, which are its callers'.
  void finish(const Frame& frame, std::size_t older);

  // Adds a card's element without a model.
  void add_unmodelled(const Frame& frame, const model::ElementCard& card, model::Unmodelled part);

  // Likewise where the card, or one that it rests on, has an error, which has been said.
  void add_broken(const Frame& frame, const model::ElementCard& card);

  // Says how many words behind values nobody has asked for.
  void tell_unused();

  // The net of a card's node.
  [[nodiscard]] model::NetId net(const Frame& frame, const model::ElementCard& card, std::uint32_t node);

 private:
  // The part of a card, or nothing where it has an error.
  using Outcome = std::optional<model::Part>;

  struct Waiting {
    model::ElementId element;
    const model::ElementCard* card;
  };

  model::ElementId place(const Frame& frame, const model::ElementCard& card, model::Part part);
  Outcome part_of(const Frame& frame, const model::ElementCard& card);

  // passives.cpp
  Outcome resistor(const Frame& frame, const model::ElementCard& card);
  Outcome reactance(const Frame& frame, const model::ElementCard& card);
  Outcome independent(const Frame& frame, const model::ElementCard& card);
  Reading passive_value(const Frame& frame, const model::ElementCard& card, const FoundModel& model);
  [[nodiscard]] FoundModel passive_model(const Frame& frame, const model::ElementCard& card) const;
  std::optional<double> fixed(const Frame& frame, const model::Assignment& assignment, model::CardId card);
  std::optional<double> tolerance(const Frame& frame, const model::ElementCard& card);
  [[nodiscard]] double spread_of(const model::ModelCard& card) const;
  // A resistance that a key of the card gives: nothing where it gives none, or 0.
  struct KeyOhms {
    std::optional<model::Number> ohms;
    bool failed = false;  // the user has been told
  };
  KeyOhms key_ohms(const Frame& frame, const model::ElementCard& card, std::string_view key);
  // Rser of the voltage source that was placed last: a resistor of its own, on a net of its own before the plus pin.
  void add_series_resistance(const Frame& frame, const model::ElementCard& card);
  std::optional<double> fixed_parameter(const Frame& frame, const model::ElementCard& card, std::string_view key);
  void detail(const Frame& frame, const model::ElementCard& card, const Quantity& quantity, const FoundModel& model);
  model::Unmodelled without_value(const Frame& frame, const model::ElementCard& card, base::NameId word);

  // devices.cpp
  Outcome device(const Frame& frame, const model::ElementCard& card);
  enum class Given : std::uint8_t { numbers, swept, failed };
  Given device_parameters(const Frame& frame, const model::ElementCard& card, model::Device& device);
  void say_left_out(const Frame& frame, const model::ElementCard& card, const model::Word& key, std::string_view why);

  // sources.cpp
  Outcome source_part(const Frame& frame, const model::ElementCard& card, model::Element& element);
  Outcome gain_source(const Frame& frame, const model::ElementCard& card, model::Element& element);
  Outcome current_controlled(const Frame& frame, const model::ElementCard& card);
  Outcome behavioural(const Frame& frame, const model::ElementCard& card, model::Element& element, bool drives_current);

  [[nodiscard]] const model::Assignment* parameter(const model::ElementCard& card, std::string_view key) const;
  void suspect(const Quantity& quantity) {
    if (quantity.odd) suspect(quantity.readings);
  }
  void suspect(const OddValue& value);
  void note_unused(const model::ElementCard& card, const FoundModel& model);

  Work& work_;
  Parameters& parameters_;
  Values& values_;
  Models& models_;
  model::ElementId current_;  // the element whose part is being made
  std::vector<Waiting> waiting_;
  const model::ElementCard* unused_ = nullptr;  // the first card with a word behind its value that is no model
  std::size_t unused_count_ = 0;
};

}  // namespace flatten
