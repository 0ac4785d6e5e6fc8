#include "report/block.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>

#include "base/text.hpp"
#include "report/figure_rows.hpp"
#include "report/summary.hpp"

namespace report {
namespace {

constexpr std::size_t longest_list = 24;

// Made printable first: what it takes on the page counts, not its bytes.
std::string shown(std::string_view name, std::size_t most = 40) {
  return base::printable_short(base::printable(name), most);
}

std::string joined(const std::vector<std::string>& names) {
  std::string out;
  for (std::size_t i = 0; i < std::min(names.size(), longest_list); ++i) out += (i == 0 ? "" : ", ") + shown(names[i]);
  if (names.size() > longest_list) out += fmt::format(" and {} more", names.size() - longest_list);
  return out;
}

std::string joined(const std::vector<model::PartName>& parts) {
  std::vector<std::string> names;
  for (const model::PartName& part : parts) names.push_back(part.name);
  return joined(names);
}

std::string arm_text(const std::vector<model::PartName>& parts, const std::string& rail) {
  if (parts.empty()) return rail.empty() ? "" : fmt::format("none, {} itself", shown(rail));
  return rail.empty() ? joined(parts) : fmt::format("{} to {}", joined(parts), shown(rail));
}

// Its volts, or the net's name while they are not known.
std::string end_text(const model::BoundEnd& end, double nominal, const model::BoardReport& board) {
  const auto* net = std::get_if<model::NetId>(&end);
  return net != nullptr && std::isnan(nominal) ? shown(net_name(board, *net)) : base::si_text(nominal, "V");
}

std::string converter_text(const model::Input& input, const model::BoardReport& board) {
  return fmt::format("{}, {} bits over {} to {}", shown(input.converter), input.bits,
                     end_text(input.low, input.nominal_low, board), end_text(input.high, input.nominal_high, board));
}

std::string sensor_text(const model::AuditedInput& input) {
  const model::Divider& divider = input.divider;
  std::string out = shown(divider.sensor_name);
  if (out.empty()) return out;
  if (divider.sensor_arm) out += *divider.sensor_arm == model::Arm::upper ? " in the upper arm" : " in the lower arm";
  if (!input.sweep || input.sweep->at.empty()) return out;
  const model::Sweep& sweep = *input.sweep;
  out += fmt::format(", {} {} to {}", base::printable(sweep.measurand), base::number_text(sweep.at.front()),
                     base::number_text(sweep.at.back()));
  return sweep.unit.empty() ? out : out + ' ' + base::printable(sweep.unit);
}

void optional_row(Page& page, std::string_view label, const std::string& text) {
  if (!text.empty()) page.row(label, text);
}

// Other sensors on the network that the reading does not depend on: its volts and ohms are those with them there.
std::string held_text(const std::vector<std::string>& held) {
  constexpr std::size_t most = 5;
  std::string out;
  for (std::size_t i = 0; i < held.size() && i < most; ++i) out += (i == 0 ? "" : ", ") + held[i];
  if (held.size() > most) out += fmt::format(" and {} more", held.size() - most);
  return out.empty() ? out
                     : out + (held.size() == 1 ? "; the reading does not depend on it"
                                               : "; the reading does not depend on them");
}

// What is said of a divider however the run goes.
void found_rows(Page& page, const model::AuditedInput& input, const model::BoardReport& board) {
  const model::Divider& divider = input.divider;
  page.row("converter", converter_text(divider.input, board));
  optional_row(page, "sensor", sensor_text(input));
  if (!divider.no_divider.empty()) page.row("divider", "none");
  optional_row(page, "upper arm", arm_text(divider.upper, divider.upper_rail));
  optional_row(page, "lower arm", arm_text(divider.lower, divider.lower_rail));
  optional_row(page, "tap", divider.tap.valid() ? shown(net_name(board, divider.tap)) : "");
  optional_row(page, "sense path", joined(divider.sense));
  optional_row(page, "load", joined(divider.load));
  optional_row(page, "held still", held_text(divider.held));
  if (!divider.leakage_where.empty())
    page.row("leakage", fmt::format("counted with {}, where it moves the reading most", divider.leakage_where));
  if (divider.bare_form) {
    const model::OnePort& form = *divider.bare_form;
    // Once solved, the form is that of the reading: where an end of the range moves with the divider, not the tap's
    // own.
    const bool of_reading = input.sweep && (divider.bare.low.valid() || divider.bare.high.valid());
    if (of_reading)
      page.row("read as", fmt::format("{} open, {} shorted, halfway at {}", base::si_text(form.open_volts, "V"),
                                      base::si_text(form.short_volts, "V"), base::si_text(form.source_ohms, "ohm")));
    else
      page.row("sensor sees", fmt::format("{}; tap at {} open, {} shorted", base::si_text(form.source_ohms, "ohm"),
                                          base::si_text(form.open_volts, "V"), base::si_text(form.short_volts, "V")));
  }
}

std::string title_of(const model::Divider& divider, std::size_t most) {
  std::string inner = shown(divider.input.converter, most);
  if (!divider.sensor_name.empty()) inner += ", " + shown(divider.sensor_name, most);
  return fmt::format("{} ({})", shown(divider.input.name, 2 * most), inner);
}

// Names are cut only where they do not fit beside the verdict.
void block_title(Page& page, const model::Divider& divider, std::string_view verdict, Tone tone) {
  std::string title = title_of(divider, 40);
  if (columns(title) + columns(verdict) + 5 > page_columns) title = title_of(divider, 12);
  page.title(title, '-', verdict, tone);
}

std::string verdict(const model::AuditedInput& input, const Summary& summary) {
  const std::string counts = counts_text(summary);
  if (!input.audited) return counts.empty() ? "not audited" : "not audited, " + counts;
  const bool passed = summary.error == 0 && summary.warning == 0;
  if (!passed) return counts;
  return counts.empty() ? "passed" : "passed, " + counts;
}

std::string candidate_text(const model::TapCandidate& candidate, bool alone) {
  std::string out = candidate.arm ? "arm" : "load";
  if (candidate.declared) out += " as declared";
  // One candidate alone needs no weighing.
  if (!alone || candidate.weight_volts != 0)
    out += fmt::format(", moves the pin by {}", base::si_text(candidate.weight_volts, "V"));
  return candidate.branches.empty() ? out : out + " through " + joined(candidate.branches);
}

void candidate_rows(Page& page, const model::Divider& divider, const model::BoardReport& board) {
  std::string_view label = "candidates";
  for (const model::TapCandidate& candidate : divider.candidates) {
    const std::string text = candidate_text(candidate, divider.candidates.size() == 1);
    page.row(label, fmt::format("{}: {}", shown(net_name(board, candidate.net)), text), Tone::plain, 2);
    label = "";
  }
}

std::string nets_text(const model::Divider& divider, const model::BoardReport& board) {
  std::vector<std::string> names;
  for (const model::NetId net : divider.nets)
    if (std::string name = net_name(board, net); !name.empty()) names.push_back(std::move(name));
  return joined(names);
}

}  // namespace

Tone tone_of(const Summary& summary) {
  if (summary.error > 0 || summary.audited < summary.inputs) return Tone::bad;
  return summary.warning > 0 ? Tone::attention : Tone::good;
}

void finding_rows(Page& page, const model::FindingList& findings, const source::Sources& sources) {
  for (const model::Finding& finding : findings) {
    const Tone tone = finding.waived                          ? Tone::faint
                      : finding.level == base::Level::error   ? Tone::bad
                      : finding.level == base::Level::warning ? Tone::attention
                                                              : Tone::plain;
    std::string text = base::printable(finding.message) + fmt::format(" [{}]", model::rule_text(finding.rule).name);
    if (finding.waived) text = fmt::format("({}) {}", base::level_text(finding.level), text);
    if (finding.where.valid()) {
      const source::Position position = sources.position(finding.where.begin);
      text += fmt::format(" {}:{}:{}", base::printable(sources[finding.where.begin.source].name), position.line,
                          position.column);
    }
    page.row(finding.waived ? "waived:" : fmt::format("{}:", base::level_text(finding.level)), text, tone);
  }
}

void audited_block(Page& page, const model::AuditedInput& input, const model::BoardReport& board) {
  const Summary summary = summary_of(input);
  block_title(page, input.divider, verdict(input, summary), tone_of(summary));
  found_rows(page, input, board);
  if (has_bar(input)) bar_rows(page, input);
  if (input.audited) figure_rows(page, input);
  finding_rows(page, input.findings, board.sources);
}

void traced_block(Page& page, const model::AuditedInput& input, const model::BoardReport& board) {
  const model::Divider& divider = input.divider;
  const bool found = divider.no_divider.empty() && divider.not_audited.empty();
  const std::string_view verdict = found ? "found" : divider.no_divider.empty() ? "cannot be audited" : "no divider";
  block_title(page, divider, verdict, found ? Tone::good : Tone::bad);
  found_rows(page, input, board);
  optional_row(page, "nets", nets_text(divider, board));
  candidate_rows(page, divider, board);
  if (divider.no_sensor) page.row("no sensor", "nothing in this divider varies");
  if (!divider.no_divider.empty()) page.row("no divider", base::printable(divider.no_divider), Tone::bad);
  for (const std::string& reason : divider.not_audited) page.row("no audit", base::printable(reason), Tone::bad);
  finding_rows(page, input.findings, board.sources);
}

}  // namespace report
