#include "network/values.hpp"

#include <limits>
#include <variant>

#include "base/overloaded.hpp"

namespace network {
namespace {

constexpr double none = std::numeric_limits<double>::quiet_NaN();

double plain(const model::Number& number) {
  return number.fixed() ? number.value : none;
}

double own_value(const model::Part& part) {
  return std::visit(base::overloaded{
                        [](const model::Resistor& r) { return plain(r.ohms); },
                        [](const model::VoltageSource& v) { return plain(v.volts); },
                        [](const model::CurrentSource& i) { return plain(i.amperes); },
                        [](const model::VoltageControlled& e) { return plain(e.gain); },
                        [](const model::CurrentControlled& f) { return plain(f.gain); },
                        [](const model::Capacitor&) { return none; },
                        [](const model::Inductor&) { return none; },
                        [](const model::Behavioural&) { return none; },
                        [](const model::Device&) { return none; },
                        [](const model::Unmodelled&) { return none; },
                    },
                    part);
}

}  // namespace

Values own_values(const model::Network& network) {
  Values values;
  values.reserve(network.branches.size());
  for (const auto& branch : network.branches) values.push_back(own_value(branch.part));
  return values;
}

void apply(Values& values, Overrides overrides) {
  for (const auto& held : overrides) values[held.branch.index()] = held.value;
}

Values values_of(const model::Network& network, Overrides overrides) {
  Values values = own_values(network);
  apply(values, overrides);
  return values;
}

}  // namespace network
