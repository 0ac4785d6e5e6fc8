#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <optional>
#include <variant>

#include "judge/rule.hpp"
#include "judge/wording.hpp"

namespace judge::rules {
namespace {

bool is_rail(const model::Sweep& sweep) {
  return sweep.sensor_ohms.empty();
}

// "from 31 % at 125 degC to 43 % at -40 degC", as the converter clips it.
std::string swing_text(const model::AuditedInput& input, const std::string& unit) {
  const auto& volts = input.sweep->pin_volts;
  const auto end_text = [&](auto end) {
    const double reading = std::clamp(input.divider.input.reading_of(*end), 0.0, 1.0);
    const auto i = static_cast<std::size_t>(end - volts.begin());
    return fmt::format("{} at {}", percent_text(reading), measurand_text(input.sweep->at[i], unit));
  };
  auto [low, high] = std::minmax_element(volts.begin(), volts.end());
  if (input.divider.input.volts_of(1) < input.divider.input.volts_of(0)) std::swap(low, high);
  return fmt::format("from {} to {}", end_text(low), end_text(high));
}

// The most that the sensor allows over a full swing from one end of the range to the other, whatever the arms:
// (sqrt k - 1)/(sqrt k + 1), k = Rmax/Rmin. Nothing where its resistance is not known.
std::optional<double> sensor_ceiling(const model::Sweep& sweep) {
  if (sweep.sensor_ohms.empty()) return std::nullopt;
  const auto [least, most] = std::minmax_element(sweep.sensor_ohms.begin(), sweep.sensor_ohms.end());
  if (!(*least > 0) || !std::isfinite(*most)) return std::nullopt;
  const double root = std::sqrt(*most / *least);
  return (root - 1) / (root + 1);
}

std::string offers_text(const model::Figures& figures) {
  std::string text = reach_text(figures);
  if (figures.other) text += (text.empty() ? "" : ", ") + offer_text(*figures.other);
  return text;
}

// Within reach: how far, and which part gets there.
std::string within_text(const model::Figures& figures, bool rail, double ceiling) {
  const std::string offers = offers_text(figures);
  const double named = std::max(figures.span_reachable.value_or(0), figures.other ? figures.other->span_use : 0.0);
  std::string text;
  if (rail)
    text = fmt::format("; {} is the most any divider reaches over this range of the rail", percent_text(ceiling));
  else if (offers.empty() || percent_text(named) != percent_text(ceiling))
    text = fmt::format("; {} can be reached with this sensor", percent_text(ceiling));
  return offers.empty() ? text : text + "; " + offers;
}

// Out of reach of any one resistor: whether more of them would do, or none.
std::string beyond_text(const model::AuditedInput& input, double ceiling, double limit) {
  const std::string offers = offers_text(input.figures);
  const std::string most = percent_text(ceiling);
  if (is_rail(*input.sweep))
    return fmt::format(
        "; no divider reaches it: {} is the most over this range of the rail{}, so it takes a converter "
        "range that begins nearer to the lowest reading",
        most, offers.empty() ? "" : fmt::format(" ({})", offers));
  std::string text = offers.empty()
                         ? fmt::format("; {} is the most between the readings of an open and a shorted sensor", most)
                         : fmt::format("; no value of a single resistor reaches it: {}", offers);
  const auto sensor = sensor_ceiling(*input.sweep);
  if (!sensor) return text;
  if (*sensor < limit) return text + ", so it takes gain or a smaller reference";
  return text + fmt::format("; the sensor itself allows {} of a full swing, so more than one value must change",
                            percent_text(*sensor));
}

// What would help, as clauses that follow the sentence.
std::string help_text(const model::AuditedInput& input, bool within_reach, double limit) {
  const model::Figures& figures = input.figures;
  const auto ceiling = ceiling_of(figures);
  if (ceiling)
    return within_reach ? within_text(figures, is_rail(*input.sweep), *ceiling) : beyond_text(input, *ceiling, limit);
  const std::string offers = offers_text(figures);
  return offers.empty() ? offers : "; " + offers;
}

// Whether the reading itself does not move; one that is past an end all the time uses nothing either, but moves.
bool stands_still(const model::AuditedInput& input) {
  const auto [low, high] = std::minmax_element(input.sweep->pin_volts.begin(), input.sweep->pin_volts.end());
  return std::fabs(input.divider.input.reading_of(*high) - input.divider.input.reading_of(*low)) < 1e-9;
}

// A reading that stands still is no matter of arm values.
std::string standstill_text(const InputContext& context) {
  const model::Input& input = context.input.divider.input;
  const model::Sweep& sweep = *context.input.sweep;
  const bool follows = is_rail(sweep) && (std::holds_alternative<model::NetId>(input.low) ||
                                          std::holds_alternative<model::NetId>(input.high));
  return fmt::format("the reading stays at {} from {} to {}, so nothing can be read from it; {}",
                     percent_text(input.reading_of(sweep.pin_volts.front())),
                     measurand_text(sweep.at.front(), context.unit), measurand_text(sweep.at.back(), context.unit),
                     follows ? "the converter's range follows the rail: it takes a range that stands still"
                             : "what the sensor moves does not reach the reading");
}

void run(const InputContext& context, Findings& out) {
  const model::Figures& figures = context.input.figures;
  const double limit = limit_of(context.input.divider.input, model::RuleId::span_use);
  if (!figures.span_use || *figures.span_use >= limit) return;
  if (stands_still(context.input)) {
    model::Finding finding = out.blank();
    finding.value = figures.span_use;
    finding.limit = limit;
    finding.unit = "fraction";
    finding.message = standstill_text(context);
    return out.add(std::move(finding));
  }
  const bool within_reach = ceiling_of(figures).value_or(limit) >= limit;
  const Compared texts = compared_percent(*figures.span_use, limit);
  model::Finding finding = out.blank();
  if (!within_reach) finding.level = base::Level::note;
  finding.value = figures.span_use;
  finding.limit = limit;
  finding.unit = "fraction";
  finding.message =
      fmt::format("the reading uses {} of the range, {}, where {} is the least accepted{}", texts.value,
                  swing_text(context.input, context.unit), texts.limit, help_text(context.input, within_reach, limit));
  out.add(std::move(finding));
}

}  // namespace

extern constinit const Rule span_use{model::RuleId::span_use, Stage::sweep, {}, run, nullptr};

}  // namespace judge::rules
