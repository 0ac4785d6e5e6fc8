// unreadable-card, missing-include, assumed-value, suspect-value outside audited networks.
#include <catch2/catch.hpp>

#include "judge/fixtures.hpp"

using base::Level;
using fixtures::board_findings;
using fixtures::place;
using model::RuleId;

namespace {

judge::BoardFacts::Unreadable at(std::uint32_t offset) {
  return {place(offset), place(offset), {}, 0};
}

model::BoardReport report_with(std::string text) {
  model::BoardReport report;
  report.sources.add({"invented.cir", std::move(text), std::nullopt});
  return report;
}

}  // namespace

TEST_CASE("A board without anything to tell has no finding") {
  CHECK(board_findings({}).empty());
}

TEST_CASE("unreadable-card: each card is a warning at its error that quotes the whole card and says why") {
  judge::BoardFacts facts;
  facts.unreadable = {{place(9, 1), place(6, 18), "expected a node", 0}};
  const auto found = board_findings(facts, report_with("title\nR1 \x07 0 (\n+ 1k\n"));
  REQUIRE(found.size() == 1);
  CHECK(found[0].rule == RuleId::unreadable_card);
  CHECK(found[0].level == Level::warning);
  CHECK(found[0].message == "this card could not be read and is left out: \"R1 \\x07 0 ( + 1k\"; expected a node");
  CHECK(found[0].where.begin.offset == 9);
}

TEST_CASE("unreadable-card: cards that one error has taken are counted at it") {
  judge::BoardFacts facts;
  facts.unreadable = {{place(6), place(6), "it has no .ends", 1}, {place(6), place(6), "", 3}};
  const auto found = board_findings(facts);
  REQUIRE(found.size() == 2);
  CHECK(found[0].message == "this card could not be read and is left out; it has no .ends; so is the card behind it");
  CHECK(found[1].message == "this card could not be read and is left out; so are the 3 cards behind it");
}

TEST_CASE("unreadable-card: beyond twenty the rest is counted") {
  judge::BoardFacts facts;
  for (std::uint32_t i = 0; i < 20; ++i) facts.unreadable.push_back(at(i));
  CHECK(board_findings(facts).size() == 20);
  facts.unreadable.push_back(at(20));
  CHECK(board_findings(facts).size() == 21);
  CHECK(board_findings(facts).back().message == "from here on 1 more could not be read and is left out");
  facts.unreadable.resize(100000, at(21));
  const auto found = board_findings(facts);
  REQUIRE(found.size() == 21);
  CHECK(found.back().message == "from here on 99980 more could not be read and are left out");
  CHECK(found.back().where.begin.offset == 20);
}

TEST_CASE("missing-include: each file is a warning at its card") {
  judge::BoardFacts facts;
  facts.missing_includes = {{place(40), "cannot include \"models/clamp.lib\": no such file"},
                            {place(70), "\"up.lib\" has no section A"}};
  const auto found = board_findings(facts);
  REQUIRE(found.size() == 2);
  CHECK(found[0].rule == RuleId::missing_include);
  CHECK(found[0].level == Level::warning);
  CHECK(found[0].message ==
        "cannot include \"models/clamp.lib\": no such file; what stands there, models and parts of the board alike, is "
        "missing here");
  CHECK(found[1].where.begin.offset == 70);
}

TEST_CASE("assumed-value: one note a board holds the whole list") {
  judge::BoardFacts facts;
  facts.netlist = place(0);
  facts.assumptions = {"AGND is taken as ground", "+3V3 is taken as 3.3 V"};
  const auto found = board_findings(facts);
  REQUIRE(found.size() == 1);
  CHECK(found[0].rule == RuleId::assumed_value);
  CHECK(found[0].level == Level::note);
  CHECK(found[0].message ==
        "taken from names and texts, where a declaration would be surer: AGND is taken as ground; +3V3 is taken as 3.3 "
        "V");
  CHECK(found[0].where.begin.offset == 0);
  CHECK(found[0].where.valid());
}

TEST_CASE("suspect-value: outside audited networks each file has one count") {
  judge::BoardFacts facts;
  facts.suspects = {{place(10), 12}, {place(90), 1}, {place(95), 0}};
  const auto found = board_findings(facts);
  REQUIRE(found.size() == 2);
  CHECK(found[0].rule == RuleId::suspect_value);
  CHECK(found[0].level == Level::note);
  CHECK(
      found[0].message ==
      "SPICE reads 12 values of this file outside the audited networks differently than the builder of the board; this "
      "is the first of them");
  CHECK(found[0].where.begin.offset == 10);
  CHECK(found[1].message ==
        "SPICE reads a value outside the audited networks differently than the builder of the board");
}
