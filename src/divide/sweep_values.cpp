#include "divide/sweep_values.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <utility>

#include "base/overloaded.hpp"
#include "base/text.hpp"
#include "divide/sensors.hpp"
#include "expression/evaluate.hpp"
#include "sensor/law.hpp"

namespace divide {
namespace {

base::Result<std::vector<double>> ohms_of(const model::SensorDeclaration& sensor, std::span<const double> at) {
  const auto law = sensor::law_of(sensor);
  if (!law.ok()) return base::Error{law.error()};
  std::vector<double> ohms;
  ohms.reserve(at.size());
  for (const double x : at) {
    const double value = law->ohms(x);
    if (!std::isfinite(value) || value <= 0)
      return base::Error{fmt::format("{} has no resistance above zero at {}", base::printable_short(sensor.name),
                                     base::number_text(x))};
    ohms.push_back(value);
  }
  return ohms;
}

base::Result<std::vector<double>> expression_values(const model::Branch& branch, const std::string& part,
                                                    const model::Circuit& circuit, std::span<const double> at) {
  const std::string name = part.empty() ? "a rail" : base::printable_short(part);
  const model::ExpressionId tree = expression_of(branch.part);
  const bool resistance = std::holds_alternative<model::Resistor>(branch.part);
  double x = 0;
  expression::Leaves leaves;
  leaves.variable = [&x](std::uint32_t) { return x; };
  std::vector<double> values;
  values.reserve(at.size());
  for (const double measurand : at) {
    x = measurand;
    const auto value = expression::evaluate(circuit.expressions, tree, leaves);
    if (const auto* trouble = std::get_if<expression::Trouble>(&value))
      return base::Error{fmt::format("the expression of {} has no value at {}: {}", name, base::number_text(measurand),
                                     trouble->message)};
    const double number = std::get<double>(value);
    if (resistance && number <= 0)
      return base::Error{fmt::format("the resistance of {} is {} at {}", name, base::si_text(number, "ohm"),
                                     base::number_text(measurand))};
    values.push_back(number);
  }
  return values;
}

base::Result<model::SweptValues> values_of(const model::SweptBranch& swept, const model::ProbedNetwork& probed,
                                           const model::Circuit& circuit, const model::SensorDeclaration& sensor,
                                           std::span<const double> at) {
  const model::Branch& branch = probed.network.branches[swept.branch.index()];
  model::SweptValues out{swept.branch, std::holds_alternative<model::Behavioural>(branch.part), {at.begin(), at.end()}};
  if (swept.quantity == model::SweptQuantity::volts || out.is_variable) return out;
  auto values = swept.quantity == model::SweptQuantity::ohms ? ohms_of(sensor, at)
                                                             : expression_values(branch, swept.part, circuit, at);
  if (!values.ok()) return base::Error{values.error()};
  out.values = std::move(values).value();
  return out;
}

model::Number* number_of(model::Part& part) {
  return std::visit(
      base::overloaded{[](model::Resistor& r) { return &r.ohms; }, [](model::VoltageSource& v) { return &v.volts; },
                       [](model::CurrentSource& i) { return &i.amperes; },
                       [](model::VoltageControlled& e) { return &e.gain; },
                       [](model::CurrentControlled& f) { return &f.gain; },
                       [](auto&) { return static_cast<model::Number*>(nullptr); }},
      part);
}

}  // namespace

bool hold(model::ProbedNetwork& probed, const model::Circuit& circuit, const model::SensorDeclaration& sensor,
          double at) {
  const auto values = swept_values(probed, circuit, sensor, {&at, 1});
  if (!values.ok()) return false;
  for (const model::SweptValues& swept : *values) {
    model::Number* const number = number_of(probed.network.branches[swept.branch.index()].part);
    if (number == nullptr) return false;
    *number = {swept.values.front(), {}};
  }
  return true;
}

bool freeze(model::Network& network, const model::Circuit& circuit, double at) {
  for (model::Branch& branch : network.branches) {
    model::Number* const number = number_of(branch.part);
    if (number == nullptr || number->fixed()) continue;
    const auto values = expression_values(branch, {}, circuit, {&at, 1});
    if (!values.ok()) return false;
    *number = {values->front(), {}};
  }
  return true;
}

base::Result<std::vector<double>> measurands(const model::SensorDeclaration& sensor, std::size_t points) {
  return sensor::sweep_points(sensor.from ? sensor.from->value : 0, sensor.to ? sensor.to->value : 0, points,
                              sensor::spacing_of(sensor));
}

base::Result<std::vector<model::SweptValues>> swept_values(const model::ProbedNetwork& probed,
                                                           const model::Circuit& circuit,
                                                           const model::SensorDeclaration& sensor,
                                                           std::span<const double> at) {
  std::vector<model::SweptValues> all;
  for (const model::SweptBranch& swept : probed.swept) {
    auto values = values_of(swept, probed, circuit, sensor, at);
    if (!values.ok()) return base::Error{values.error()};
    all.push_back(std::move(values).value());
  }
  return all;
}

}  // namespace divide
