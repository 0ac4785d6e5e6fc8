#include "audit/audit.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <map>
#include <set>
#include <unordered_set>
#include <utility>

#include "audit/reading.hpp"
#include "audit/solving.hpp"
#include "base/text.hpp"
#include "divide/divide.hpp"
#include "flatten/flatten.hpp"
#include "judge/judge.hpp"

namespace audit {
namespace {

std::string place_text(const Reading& reading, source::Place place) {
  return fmt::format("{}:{}", reading.sources[place.source].name, reading.sources.position(place).line);
}

// Cards with errors, each with its reason. Those that a header without its end has taken are counted at the header.
std::vector<judge::BoardFacts::Unreadable> unreadable_cards(const Reading& reading) {
  const model::Netlist& netlist = reading.netlist;
  std::vector<judge::BoardFacts::Unreadable> cards;
  std::map<model::CardId, std::size_t> told;  // by card, where in `cards`
  for (std::uint32_t i = 0; i < netlist.cards.size(); ++i) {
    const model::CardId id{i};
    if (netlist.cards[i].fate != model::CardFate::error) continue;
    const auto fault = netlist.faults.find(id);
    const model::CardId cause = fault == netlist.faults.end() ? model::CardId{} : fault->second.cause;
    const auto header = told.find(cause);
    if (header != told.end() && fault->second.reason.empty()) {
      ++cards[header->second].taken;
      continue;
    }
    told.emplace(id, cards.size());
    auto& card = cards.emplace_back();
    card.card = card.where = netlist.span(id);
    if (fault == netlist.faults.end()) continue;
    card.reason = fault->second.reason;
    if (cause.valid())
      card.reason += fmt::format(" ({})", place_text(reading, netlist.span(cause).begin));
    else
      card.where = fault->second.where;
  }
  return cards;
}

// Sources without a DC value that audited networks rest on.
void add_time_zero(const Reading& reading, const model::Division& division, judge::BoardFacts& facts) {
  std::set<model::ElementId> sources;
  for (const auto& divider : division.dividers)
    sources.insert(divider.at_time_zero.begin(), divider.at_time_zero.end());
  for (const model::ElementId id : sources) {
    const model::Element& source = reading.circuit.elements[id.index()];
    const auto* const volts = std::get_if<model::VoltageSource>(&source.part);
    const auto* const amperes = std::get_if<model::CurrentSource>(&source.part);
    const model::Number value = volts != nullptr     ? volts->volts
                                : amperes != nullptr ? amperes->amperes
                                                     : model::Number{};
    if (!value.fixed()) continue;
    facts.assumptions.push_back(fmt::format("{} is taken at {}, where its signal begins: it has no DC value",
                                            base::printable_short(reading.names.text(source.name)),
                                            base::si_text(value.value, volts != nullptr ? "V" : "A")));
  }
}

// The facts of a board that its own rules judge.
judge::BoardFacts facts_of(const Reading& reading, const model::Division& division) {
  judge::BoardFacts facts;
  facts.netlist = {{reading.netlist.root, 0}, 0};
  facts.levels = reading.sheet.levels;
  facts.unreadable = unreadable_cards(reading);
  for (const auto& missing : reading.netlist.missing_includes)
    facts.missing_includes.push_back({missing.where, missing.what});
  for (const auto& assumption : division.assumptions) facts.assumptions.push_back(assumption.text);
  add_time_zero(reading, division, facts);
  std::unordered_set<std::uint32_t> told;
  for (const auto& divider : division.dividers)
    for (const auto& suspect : divider.suspects) told.insert(suspect.element.value);
  std::map<std::uint32_t, judge::BoardFacts::Elsewhere> by_file;
  for (const auto& suspect : reading.circuit.suspects) {
    if (told.contains(suspect.element.value)) continue;
    auto& entry = by_file[suspect.where.begin.source.value];
    if (entry.count++ == 0) entry.where = suspect.where;
  }
  for (const auto& [file, entry] : by_file) facts.suspects.push_back(entry);
  return facts;
}

std::vector<std::string> not_checked(const model::Sheet& sheet) {
  std::vector<std::string> lines;
  for (const auto& key : sheet.unused)
    lines.push_back(fmt::format("{}: {}", base::printable_short(key.key), key.missing));
  return lines;
}

void complain(Reading& reading, model::BoardReport& report, std::string message) {
  reading.diagnostics.push_back({base::Level::error, {{reading.netlist.root, 0}, 0}, std::move(message)});
  report.done_in_whole = false;
}

// Whether the text holds anything that could be audited; says why not.
bool worth_auditing(Reading& reading, model::BoardReport& report) {
  if (reading.sheet_has_errors) {
    report.done_in_whole = false;  // each error has been said at its place
    return false;
  }
  for (const std::string& cut : {reading.netlist.cut, reading.circuit.cut})
    if (!cut.empty())
      return complain(reading, report, cut + ", so a part of the board is missing and nothing is audited"), false;
  const auto& count = report.reading;
  if (count.cards == 0) return complain(reading, report, "the netlist has no cards"), false;
  if (count.error == count.cards) return complain(reading, report, "no card of the netlist could be read"), false;
  if (reading.sheet.converters.empty())
    return complain(reading, report,
                    "no converter is declared, so there is no input to audit: declare [converter.NAME] with bits, high "
                    "and inputs"),
           false;
  return true;
}

std::string drawn(const Reading& reading) {
  std::string text;
  for (const auto& diagnostic : reading.diagnostics) text += source::draw(reading.sources, diagnostic);
  return text;
}

// Reports name nets by these: they never see the circuit.
void name_nets(const Reading& reading, const model::Divider& divider, model::BoardReport& report) {
  const auto name = [&](model::NetId net) {
    if (net.valid())
      report.net_names.try_emplace(
          net, net == model::ground ? "0" : std::string(reading.names.text(reading.circuit.nets[net.index()].name)));
  };
  name(divider.tap);
  for (const model::BoundEnd* end : {&divider.input.low, &divider.input.high})
    if (const auto* net = std::get_if<model::NetId>(end)) name(*net);
  for (const auto& candidate : divider.candidates) name(candidate.net);
  for (const model::NetId net : divider.nets) name(net);
}

// The card of an arm's part: an element or an instance; none for a label of the declarations.
model::CardId card_of(const Reading& reading, const model::PartName& part) {
  if (part.element.valid()) return reading.circuit.elements[part.element.index()].card;
  for (const model::Instance& instance : reading.circuit.instances)
    if (base::same_name(reading.names.text(instance.name), part.name)) return instance.card;
  return {};
}

// Where a reader would begin to look: the sensor's own card, else that of the divider's first part.
source::Span place_of(const Reading& reading, const model::Divider& divider) {
  model::CardId first;
  for (const auto* arm : {&divider.upper, &divider.lower}) {
    for (const model::PartName& part : *arm) {
      const model::CardId card = card_of(reading, part);
      if (card.valid() && (!first.valid() || part.name == divider.sensor_name)) first = card;
    }
  }
  return first.valid() ? reading.netlist.span(first) : source::Span{};
}

void take_inputs(const Reading& reading, model::Division& division, model::BoardReport& report) {
  for (auto& divider : division.dividers) {
    name_nets(reading, divider, report);
    model::AuditedInput input;
    input.place = place_of(reading, divider);
    input.divider = std::move(divider);
    report.inputs.push_back(std::move(input));
  }
}

}  // namespace

BoardRun audit_board(const std::string& netlist, const Options& options, simulate::Session* session) {
  BoardRun run;
  model::BoardReport& report = run.report;
  report.netlist = netlist;
  Reading reading = read_board(netlist, options);
  if (!reading.failure.empty()) {
    report.done_in_whole = false;
    run.diagnostics = reading.failure;
    return run;
  }
  report.reading = flatten::count_cards(reading.netlist);
  report.include_missing = !reading.netlist.missing_includes.empty();
  report.not_checked = not_checked(reading.sheet);
  model::Division division;
  if (worth_auditing(reading, report)) {
    const std::size_t before = source::count(reading.diagnostics, base::Level::error);
    division =
        divide::divide({reading.netlist, reading.sources, reading.circuit, reading.sheet, reading.names, options.only},
                       reading.diagnostics);
    if (source::count(reading.diagnostics, base::Level::error) != before)
      report.done_in_whole = false;
    else if (division.dividers.empty() && options.only.empty())
      complain(reading, report, "the declared converters have no input to audit");
  }
  const judge::BoardFacts facts = facts_of(reading, division);
  take_inputs(reading, division, report);
  if (session != nullptr) solve_and_judge(reading, options.points, *session, report);
  run.diagnostics = drawn(reading);
  report.sources = std::move(reading.sources);
  if (session != nullptr) judge::judge_board(report, facts);
  return run;
}

}  // namespace audit
