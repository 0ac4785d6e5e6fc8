#include "divide/names.hpp"

#include <algorithm>
#include <array>
#include <fmt/format.h>

#include "base/text.hpp"

namespace divide {
namespace {

constexpr std::array<std::string_view, 4> zero_names{"0", "gnd", "/gnd", "gnd!"};
constexpr std::array<std::string_view, 6> ground_names{"agnd", "dgnd", "vss", "/agnd", "/dgnd", "/vss"};

template <class Id>
Id at_name(const std::vector<Id>& of_name, const base::NameTable& names, std::string_view name) {
  const auto id = names.find(name);
  return id && id->index() < of_name.size() ? of_name[id->index()] : Id{};
}

bool is_glob(std::string_view text) {
  return text.find_first_of("*?") != std::string_view::npos;
}

template <class Id, class Items, class Name>
std::vector<Id> matching(std::string_view glob, Id exact, const Items& items, const Name& name_of) {
  if (exact.valid()) return {exact};
  std::vector<Id> found;
  if (!is_glob(glob)) return found;
  for (std::uint32_t i = 0; i < items.size(); ++i)
    if (base::glob_match(glob, name_of(Id{i}))) found.push_back(Id{i});
  return found;
}

std::string suggestion(std::string_view wanted, const std::vector<std::string_view>& candidates) {
  const std::string_view nearest = base::nearest_name(wanted, candidates);
  return nearest.empty() ? std::string{} : fmt::format("; did you mean \"{}\"?", base::printable_short(nearest));
}

}  // namespace

bool is_ground_name(std::string_view name) {
  return std::any_of(ground_names.begin(), ground_names.end(),
                     [&](std::string_view known) { return base::same_name(known, name); });
}

NameIndex::NameIndex(const model::Circuit& circuit, const base::NameTable& names)
    : circuit_(circuit),
      names_(names),
      net_of_name_(names.size()),
      element_of_name_(names.size()),
      instance_of_name_(names.size()) {
  // Backwards, so that the first bearer of a name is the one that is found.
  for (auto i = static_cast<std::uint32_t>(circuit.nets.size()); i-- > 0;)
    net_of_name_[circuit.nets[i].name.index()] = model::NetId{i};
  for (auto i = static_cast<std::uint32_t>(circuit.elements.size()); i-- > 0;)
    element_of_name_[circuit.elements[i].name.index()] = model::ElementId{i};
  for (auto i = static_cast<std::uint32_t>(circuit.instances.size()); i-- > 0;)
    instance_of_name_[circuit.instances[i].name.index()] = model::InstanceId{i};
}

model::NetId NameIndex::net(std::string_view name) const {
  for (const std::string_view zero : zero_names)
    if (base::same_name(zero, name)) return model::ground;
  return at_name(net_of_name_, names_, name);
}

model::ElementId NameIndex::element(std::string_view name) const {
  return at_name(element_of_name_, names_, name);
}
model::InstanceId NameIndex::instance(std::string_view name) const {
  return at_name(instance_of_name_, names_, name);
}

std::vector<model::NetId> NameIndex::nets(std::string_view glob) const {
  auto found = matching(glob, net(glob), circuit_.nets, [this](model::NetId id) { return text(id); });
  if (!net(glob).valid()) std::erase(found, model::ground);
  return found;
}

std::vector<model::ElementId> NameIndex::elements(std::string_view glob) const {
  return matching(glob, element(glob), circuit_.elements, [this](model::ElementId id) { return text(id); });
}

std::vector<model::InstanceId> NameIndex::instances(std::string_view glob) const {
  return matching(glob, instance(glob), circuit_.instances, [this](model::InstanceId id) { return text(id); });
}

std::string_view NameIndex::text(model::NetId net) const {
  return net == model::ground ? "0" : names_.text(circuit_.nets[net.index()].name);
}
std::string_view NameIndex::text(model::ElementId element) const {
  return names_.text(circuit_.elements[element.index()].name);
}
std::string_view NameIndex::text(model::InstanceId instance) const {
  return names_.text(circuit_.instances[instance.index()].name);
}

std::string NameIndex::suggest_net(std::string_view wanted) const {
  std::vector<std::string_view> candidates;
  // Ground is there in every circuit: nobody meant it by another name.
  for (std::uint32_t i = 1; i < circuit_.nets.size(); ++i) candidates.push_back(text(model::NetId{i}));
  return suggestion(wanted, candidates);
}

std::string NameIndex::suggest_part(std::string_view wanted) const {
  std::vector<std::string_view> candidates;
  for (std::uint32_t i = 0; i < circuit_.elements.size(); ++i) candidates.push_back(text(model::ElementId{i}));
  for (std::uint32_t i = 0; i < circuit_.instances.size(); ++i) candidates.push_back(text(model::InstanceId{i}));
  return suggestion(wanted, candidates);
}

}  // namespace divide
