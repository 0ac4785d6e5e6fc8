// The table of kinds, and what is asked of every law alike.
#include <algorithm>
#include <array>
#include <cmath>
#include <fmt/format.h>

#include "base/names.hpp"
#include "base/text.hpp"
#include "sensor/law.hpp"

// One line a kind, in the order of the manual; each is a function of that name in its own file.
#define SENSOR_KINDS(KIND) \
  KIND(ntc)                \
  KIND(rtd)                \
  KIND(photoresistor)      \
  KIND(voltage)            \
  KIND(parameter)

namespace sensor {

#define DECLARE_KIND(name) Kind name##_kind();
SENSOR_KINDS(DECLARE_KIND)
#undef DECLARE_KIND

namespace {

std::string known_kinds() {
  std::string text;
  for (const Kind& kind : kinds()) text += fmt::format("{}{}", text.empty() ? "" : ", ", kind.name);
  return text;
}

// The law has a resistance there. Its validity may end at a value that is itself outside (absolute zero, darkness).
bool holds(const Law& law, double at) {
  if (!(at >= law.valid_from && at <= law.valid_to)) return false;
  const double ohms = law.ohms(at);
  return std::isfinite(ohms) && ohms > 0;
}

base::Error outside(const Law& law, std::string_view key, double at, const Kind& kind) {
  return {fmt::format("\"{}\" = {} {} leaves the law's validity: {}", key, base::number_text(at, 7), kind.unit,
                      law.validity)};
}

}  // namespace

std::span<const Kind> kinds() {
#define CALL_KIND(name) name##_kind(),
  static const std::array table{SENSOR_KINDS(CALL_KIND)};
#undef CALL_KIND
  return table;
}

const Kind* find_kind(std::string_view name) {
  const auto all = kinds();
  const auto at = std::ranges::find(all, name, &Kind::name);
  return at == all.end() ? nullptr : &*at;
}

base::Result<Law> law_of(const model::SensorDeclaration& declaration) {
  const Kind* kind = find_kind(declaration.kind.value);
  if (kind == nullptr)
    return base::Error{fmt::format("\"{}\" is no kind of sensor: expected one of {}",
                                   base::printable_short(declaration.kind.value), known_kinds())};
  if (kind->make == nullptr)
    return base::Error{fmt::format("a sensor of kind \"{}\" has no resistance of its own", kind->name)};
  auto law = kind->make(declaration.settings);
  if (!law) return base::Error{fmt::format("kind \"{}\": {}", kind->name, law.error())};
  if (declaration.from && !holds(*law, declaration.from->value))
    return outside(*law, "from", declaration.from->value, *kind);
  if (declaration.to && !holds(*law, declaration.to->value)) return outside(*law, "to", declaration.to->value, *kind);
  return law;
}

base::Result<std::vector<double>> sweep_points(double from, double to, std::size_t points, model::Spacing spacing) {
  if (points == 0) return base::Error{"a sweep needs at least one point"};
  if (!std::isfinite(from) || !std::isfinite(to)) return base::Error{"the ends of a sweep must be finite"};
  const bool logarithmic = spacing == model::Spacing::logarithmic;
  if (logarithmic && !(from > 0 && to > 0))
    return base::Error{fmt::format("logarithmic spacing needs both ends above zero, not {} to {}",
                                   base::number_text(from, 7), base::number_text(to, 7))};
  std::vector<double> at(points, from);
  const double last = static_cast<double>(points - 1);
  for (std::size_t i = 1; i < points; ++i) {
    const double step = static_cast<double>(i);
    at[i] = logarithmic ? from * std::exp(std::log(to / from) * step / last) : from + (to - from) * step / last;
  }
  if (points > 1) at.back() = to;
  return at;
}

model::Spacing spacing_of(const model::SensorDeclaration& declaration) {
  if (declaration.spacing) return declaration.spacing->value;
  const Kind* kind = find_kind(declaration.kind.value);
  return kind != nullptr && kind->logarithmic ? model::Spacing::logarithmic : model::Spacing::linear;
}

}  // namespace sensor
