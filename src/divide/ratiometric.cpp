#include "divide/ratiometric.hpp"

#include <algorithm>
#include <cmath>

#include "base/overloaded.hpp"

namespace divide {
namespace {

bool is_zero(const model::Number& number) {
  return number.fixed() && number.value == 0;
}

// Whether a part does nothing to its network that would not double with the rail.
bool is_in_proportion(const model::Part& part) {
  return std::visit(base::overloaded{[](const model::VoltageSource& v) { return is_zero(v.volts); },
                                     [](const model::CurrentSource& i) { return is_zero(i.amperes); },
                                     [](const model::Behavioural&) { return false; },
                                     [](const model::Device&) { return false; }, [](const auto&) { return true; }},
                    part);
}

bool feeds_alone(const Graph& graph, const Surroundings& around, const Rail& swept) {
  const auto rails = rails_of(graph, around);
  return std::all_of(rails.begin(), rails.end(),
                     [&](const Rail* rail) {
                       return rail == &swept || (rail->has_volts && !rail->sensor && is_zero(rail->volts));
                     }) &&
         std::all_of(around.edges.begin(), around.edges.end(),
                     [&](Edge edge) { return is_in_proportion(graph.part(edge)); });
}

// An end that is a net is one of the surroundings.
bool is_net_or_zero(const model::BoundEnd& end) {
  const auto* volts = std::get_if<double>(&end);
  return volts == nullptr || *volts == 0;
}

}  // namespace

std::optional<double> leakage_share(const Graph& graph, const Surroundings& around, const model::Input& input,
                                    const Rail& swept, const model::SensorDeclaration& sweep) {
  if (!swept.volts.fixed() || !sweep.from || !sweep.to) return {};
  const double from = sweep.from->value;
  const double to = sweep.to->value;
  const bool passes_zero = from == 0 || to == 0 || std::signbit(from) != std::signbit(to);
  if (passes_zero || !is_net_or_zero(input.low) || !is_net_or_zero(input.high) || !feeds_alone(graph, around, swept))
    return {};
  if (!swept.has_volts) return 1;  // nothing can be solved before somebody gives it a voltage at rest
  if (swept.volts.value == 0) return {};
  return std::fabs(swept.volts.value) / std::min(std::fabs(from), std::fabs(to));
}

}  // namespace divide
