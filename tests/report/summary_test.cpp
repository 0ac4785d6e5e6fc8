#include "report/summary.hpp"

#include <catch2/catch.hpp>

#include "tests/report/sample.hpp"

TEST_CASE("a run counts its boards, inputs and findings, those of boards included") {
  const report::Summary summary = report::summary_of(sample::everything());
  CHECK(summary.boards == 1);
  CHECK(summary.inputs == 6);
  CHECK(summary.audited == 5);
  CHECK(summary.error == 3);
  CHECK(summary.warning == 3);
  CHECK(summary.note == 1);
}

TEST_CASE("a waived finding counts as waived and at no level") {
  const report::Summary summary = report::summary_of(sample::poor_span());
  CHECK(summary.warning == 1);
  CHECK(summary.note == 0);
  CHECK(summary.waived == 1);
}

TEST_CASE("counts are told most serious first, and only those that are not zero") {
  report::Summary summary;
  CHECK(report::counts_text(summary).empty());
  summary.warning = 2;
  summary.error = 1;
  CHECK(report::counts_text(summary) == "1 error, 2 warnings");
  summary.note = 1;
  summary.waived = 3;
  CHECK(report::counts_text(summary) == "1 error, 2 warnings, 1 note, 3 waived");
}

TEST_CASE("a net without a known name has an empty one") {
  const model::BoardReport board = sample::board({});
  CHECK(report::net_name(board, model::ground) == "0");
  CHECK(report::net_name(board, model::NetId{99}).empty());
  CHECK(report::net_name(board, model::NetId{}).empty());
}
