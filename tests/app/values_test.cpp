#include "app/values.hpp"

#include <catch2/catch.hpp>

namespace {

template <class T>
std::string failure(const base::Result<T>& result) {
  return result.ok() ? "taken" : result.error();
}

}  // namespace

TEST_CASE("a whole number is taken from its least to its most value") {
  CHECK(app::whole_number("2", 2, 10).value() == 2);
  CHECK(app::whole_number("10", 2, 10).value() == 10);
  for (const char* wrong : {"1", "11", "", "-3", "+3", "3.0", "3e0", " 3", "3 ", "0x3", "99999999999999999999999"})
    CHECK(failure(app::whole_number(wrong, 2, 10)) ==
          "expected a whole number from 2 to 10, got \"" + std::string(wrong) + "\"");
}

TEST_CASE("seconds are above zero and at most a day") {
  CHECK(app::seconds("0.5").value() == 0.5);
  CHECK(app::seconds("86400").value() == 86400);
  for (const char* wrong : {"0", "-1", "nan", "inf", "86401", "1s", ""})
    CHECK(failure(app::seconds(wrong)) ==
          "expected seconds above 0, at most 86400, got \"" + std::string(wrong) + "\"");
}

TEST_CASE("a gate is one of four words") {
  CHECK(app::gate_of("error").value() == app::Gate::error);
  CHECK(app::gate_of("warning").value() == app::Gate::warning);
  CHECK(app::gate_of("note").value() == app::Gate::note);
  CHECK(app::gate_of("never").value() == app::Gate::never);
  CHECK(failure(app::gate_of("Errors")) == "expected error, warning, note or never, got \"Errors\"");
}

// ISO 8601 calendar dates; leap years by the Gregorian rule.
TEST_CASE("a date is a day of the calendar") {
  for (const char* right : {"2026-12-01", "2024-02-29", "2000-02-29", "0001-01-01", "9999-12-31"})
    CHECK(app::date_of(right).value() == right);
  for (const char* wrong : {"2026-13-01", "2026-02-29", "1900-02-29", "2026-04-31", "2026-00-10", "2026-01-00"})
    CHECK(failure(app::date_of(wrong)) == "\"" + std::string(wrong) + "\" is no day of the calendar");
  for (const char* wrong :
       {"", "today", "2026-1-1", "26-01-01", "2026/01/01", "2026-01-01T00", "2026-0a-01", "+026-01-01"})
    CHECK(failure(app::date_of(wrong)) == "expected a date as YYYY-MM-DD, got \"" + std::string(wrong) + "\"");
}

TEST_CASE("today is a date") {
  CHECK(app::date_of(app::today()).ok());
}

TEST_CASE("each limit is set by its name and leaves the others as they are") {
  source::Limits limits;
  CHECK(app::set_limit("points=200000", limits).ok());
  CHECK(app::set_limit("file_bytes=18446744073709551615", limits).ok());
  CHECK(limits.points == 200000);
  CHECK(limits.file_bytes == ~std::uint64_t{0});
  CHECK(limits.elements == source::Limits{}.elements);
}

TEST_CASE("a limit without a name, without a number, or of no known name is refused") {
  source::Limits limits;
  CHECK(failure(app::set_limit("points", limits)) == "expected NAME=N, got \"points\"");
  CHECK(failure(app::set_limit("points=", limits)) ==
        "expected a whole number from 1 to 18446744073709551615, got \"\"");
  CHECK(failure(app::set_limit("points=0", limits)) ==
        "expected a whole number from 1 to 18446744073709551615, got \"0\"");
  CHECK(failure(app::set_limit("point=5", limits)) ==
        "no limit is named \"point\"; there are file_bytes, line_bytes, include_depth, includes, nesting, "
        "expression_depth, "
        "elements, points");
  CHECK(limits.points == source::Limits{}.points);
}
