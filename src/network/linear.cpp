#include "network/linear.hpp"

#include <cmath>
#include <limits>

#include "network/solver.hpp"
#include "network/values.hpp"

namespace network {
namespace {

constexpr double open = std::numeric_limits<double>::infinity();

// Below this part of the smallest resistance a Thevenin resistance is what rounding leaves of zero.
constexpr double dust = 1e-9;

base::Error in_case(const char* what, const std::string& why) {
  return {std::string(what) + why};
}

base::Result<double> ohms_between(const Solver& solver, model::NodeId plus, model::NodeId minus) {
  if (!solver.reached(plus) || !solver.reached(minus))
    return base::Error{"no finite resistance is seen between the nodes"};
  const auto response = solver.with_ampere(plus, minus);
  if (!response) return base::Error{response.error()};
  const double ohms = solver.volts(*response, plus) - solver.volts(*response, minus);
  return std::abs(ohms) <= dust * solver.equations().smallest_ohms ? 0.0 : ohms;
}

base::Result<double> probe_volts(const model::Network& network, const Values& values, model::NodeId probe) {
  const auto solver = Solver::make(network, values);
  if (!solver) return base::Error{solver.error()};
  const auto solution = solver->with_sources(values);
  if (!solution) return base::Error{solution.error()};
  return solver->volts(*solution, probe);
}

}  // namespace

base::Result<std::vector<double>> node_volts(const model::Network& network, Overrides overrides) {
  const Values values = values_of(network, overrides);
  const auto solver = Solver::make(network, values);
  if (!solver) return base::Error{solver.error()};
  const auto solution = solver->with_sources(values);
  if (!solution) return base::Error{solution.error()};
  std::vector<double> volts(network.node_count, 0.0);
  for (std::uint32_t n = 1; n < network.node_count; ++n) volts[n] = solver->volts(*solution, model::NodeId{n});
  return volts;
}

base::Result<model::OnePort> one_port(const model::Network& network, model::BranchId resistor, model::NodeId probe,
                                      Overrides overrides) {
  Values values = values_of(network, overrides);
  const auto& ends = network.branches[resistor.index()].nodes;
  model::OnePort form;

  values[resistor.index()] = open;
  const auto solver = Solver::make(network, values);
  if (!solver) return in_case("with the resistor open ", solver.error());
  const auto at_open = solver->with_sources(values);
  if (!at_open) return in_case("with the resistor open ", at_open.error());
  form.open_volts = solver->volts(*at_open, probe);

  const auto source_ohms = ohms_between(*solver, ends[0], ends[1]);
  if (!source_ohms) return base::Error{source_ohms.error()};
  if (!(*source_ohms > 0)) return base::Error{"the resistor sees a source resistance that is not above zero"};
  form.source_ohms = *source_ohms;

  values[resistor.index()] = 0;
  const auto at_short = probe_volts(network, values, probe);
  if (!at_short) return in_case("with the resistor shorted ", at_short.error());
  form.short_volts = *at_short;
  return form;
}

base::Result<double> thevenin_ohms(const model::Network& network, model::NodeId plus, model::NodeId minus,
                                   model::BranchId without, Overrides overrides) {
  Values values = values_of(network, overrides);
  if (without.valid()) values[without.index()] = open;
  const auto solver = Solver::make(network, values);
  if (!solver) return base::Error{solver.error()};
  return ohms_between(*solver, plus, minus);
}

double volts_at(const model::OnePort& form, double ohms) {
  if (std::isinf(ohms)) return form.open_volts;
  return form.open_volts + (form.short_volts - form.open_volts) * (form.source_ohms / (form.source_ohms + ohms));
}

double ohms_at(const model::OnePort& form, double volts) {
  if (volts == form.open_volts && volts != form.short_volts) return open;
  const double ohms = form.source_ohms * (form.short_volts - volts) / (volts - form.open_volts);
  return ohms >= 0 ? ohms : std::numeric_limits<double>::quiet_NaN();
}

// With V = (Vopen Rx + Vshort Rs)/(Rx + Rs) for both, the denominators cancel.
base::Result<model::OnePort> quotient_form(const model::OnePort& over, const model::OnePort& under) {
  const double source_ohms = under.source_ohms * under.short_volts / under.open_volts;
  if (!(source_ohms > 0) || !std::isfinite(source_ohms))
    return base::Error{"the quotient has no finite source resistance above zero"};
  return model::OnePort{over.open_volts / under.open_volts, over.short_volts / under.short_volts, source_ohms};
}

}  // namespace network
