#include "report/bar.hpp"

#include <algorithm>
#include <string>

#include <catch2/catch.hpp>

using report::bar;
using report::Reach;

namespace {

std::string plain(double low, double high) {
  return bar({low, high, low, high, 0});
}

std::ptrdiff_t count(const std::string& text, char c) {
  return std::count(text.begin(), text.end(), c);
}

}  // namespace

TEST_CASE("a bar is as wide as its scale, whatever the reading") {
  const std::size_t width = report::bar_cells + 2;
  CHECK(report::bar_scale().size() == width);
  for (const double low : {-1e300, -1.0, 0.0, 0.5, 1.0, 2.0, 1e300})
    for (const double high : {-1e300, -1.0, 0.0, 0.5, 1.0, 2.0, 1e300})
      if (low <= high) CHECK(bar({low, high, low, high, 0.02}).size() == width);
}

TEST_CASE("a swing over the whole range fills the bar") {
  CHECK(plain(0, 1) == '|' + std::string(report::bar_cells, '=') + '|');
}

TEST_CASE("a swing over the lower half fills the lower half") {
  CHECK(plain(0, 0.5) == '|' + std::string(report::bar_cells / 2, '=') + std::string(report::bar_cells / 2, ' ') + '|');
}

TEST_CASE("a swing of nothing still has a cell") {
  CHECK(count(plain(0.5, 0.5), '=') == 1);
  CHECK(plain(0, 0)[1] == '=');
  CHECK(plain(1, 1)[report::bar_cells] == '=');
}

TEST_CASE("what the envelope adds stands beside the swing") {
  const std::string text = bar({0.5, 0.75, 0.25, 1, 0});
  CHECK(text == '|' + std::string(15, ' ') + std::string(15, '-') + std::string(15, '=') + std::string(15, '-') + '|');
}

TEST_CASE("a reading past an end turns the bar's end into an arrow") {
  CHECK(plain(-0.1, 0.5).front() == '<');
  CHECK(plain(-0.1, 0.5).back() == '|');
  CHECK(plain(0.5, 1.1).back() == '>');
  CHECK(plain(0, 1).front() == '|');
  CHECK(plain(0, 1).back() == '|');
}

TEST_CASE("a reading that is past an end as a whole leaves the bar empty") {
  CHECK(plain(1.2, 1.5) == '|' + std::string(report::bar_cells, ' ') + '>');
  CHECK(plain(-0.5, -0.2) == '<' + std::string(report::bar_cells, ' ') + '|');
}

TEST_CASE("cells that are to be kept clear are marked, and the reading in them stands out") {
  CHECK(bar({0.5, 0.6, 0.5, 0.6, 0.05}).substr(0, 5) == "|::: ");
  CHECK(bar({0.02, 0.6, 0.02, 0.6, 0.05}).substr(0, 6) == "|:!!==");
  CHECK(bar({0.5, 0.98, 0.5, 0.98, 0.05}).substr(report::bar_cells - 4) == "==!!:|");
}

TEST_CASE("a reading that keeps exactly its distance is not marked") {
  CHECK(count(bar({0.02, 0.98, 0.02, 0.98, 0.02}), '!') == 0);
  CHECK(count(bar({0.0199, 0.98, 0.0199, 0.98, 0.02}), '!') > 0);
}

TEST_CASE("an envelope alone in the cells to be kept clear stands out too") {
  CHECK(bar({0.5, 0.6, 0.01, 0.6, 0.05}).substr(0, 5) == "|!!!-");
}
