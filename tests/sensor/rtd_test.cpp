#include <cmath>

#include <catch2/catch.hpp>

#include "declared.hpp"
#include "sensor/law.hpp"

using sensor_test::declared;
using sensor_test::law;

namespace {

struct Row {
  double degrees, ohms;
};

// Pt100 table of IEC 60751 (clause 4.2, table of resistance values).
constexpr Row table[] = {{-200, 18.52}, {-100, 60.26}, {-50, 80.31},  {-20, 92.16},  {0, 100.00},
                         {50, 119.40},  {100, 138.51}, {150, 157.33}, {200, 175.86}, {300, 212.05},
                         {400, 247.09}, {600, 313.71}, {850, 390.48}};

}  // namespace

TEST_CASE("a Pt100 meets the table of IEC 60751 to its last digit") {
  const auto pt100 = law("rtd", {{"r0", 100}});
  for (const Row row : table) CHECK(pt100.ohms(row.degrees) == Approx(row.ohms).margin(0.005));
}

TEST_CASE("a Pt1000 is ten times the Pt100 table of IEC 60751") {
  const auto pt1000 = law("rtd", {{"r0", 1000}});
  for (const Row row : table) CHECK(pt1000.ohms(row.degrees) == Approx(10 * row.ohms).margin(0.05));
}

TEST_CASE("a Pt100 is the polynomial of IEC 60751 clause 4.1") {
  const auto pt100 = law("rtd", {{"r0", 100}});
  // Computed from the polynomial.
  CHECK(pt100.ohms(-200) == Approx(18.520080).margin(5e-7));
  CHECK(pt100.ohms(-100) == Approx(60.255840).margin(5e-7));
  CHECK(pt100.ohms(-20) == Approx(92.159898).margin(5e-7));
  CHECK(pt100.ohms(25) == Approx(109.734656).margin(5e-7));
  CHECK(pt100.ohms(850) == Approx(390.481125).margin(5e-7));
  CHECK(pt100.measurand(110).value() == Approx(25.684047).margin(5e-7));
}

TEST_CASE("temperature to ohms and back is the same temperature over all of IEC 60751's range") {
  const auto pt1000 = law("rtd", {{"r0", 1000}});
  for (double t = -200; t <= 850; t += 5) CHECK(pt1000.measurand(pt1000.ohms(t)).value() == Approx(t).margin(1e-9));
}

TEST_CASE("a resistance outside IEC 60751's range has no measurand") {
  const auto pt100 = law("rtd", {{"r0", 100}});
  CHECK_FALSE(pt100.measurand(18.51).has_value());
  CHECK_FALSE(pt100.measurand(390.49).has_value());
  CHECK_FALSE(pt100.measurand(-1).has_value());
  CHECK_FALSE(pt100.measurand(std::nan("")).has_value());
}

TEST_CASE("an rtd's range may reach the ends of IEC 60751 and not pass them") {
  CHECK(sensor::law_of(declared("rtd", {{"r0", 100}}, -200, 850)).ok());
  CHECK(sensor::law_of(declared("rtd", {{"r0", 100}}, -200.1, 850)).error() ==
        "\"from\" = -200.1 degC leaves the law's validity: IEC 60751 holds from -200 to 850 degC");
  CHECK(sensor::law_of(declared("rtd", {{"r0", 100}}, 0, 851)).error() ==
        "\"to\" = 851 degC leaves the law's validity: IEC 60751 holds from -200 to 850 degC");
}

TEST_CASE("an rtd needs its resistance at 0 degC, above zero") {
  CHECK(sensor::law_of(declared("rtd", {})).error() == "kind \"rtd\": \"r0\" is missing");
  CHECK(sensor::law_of(declared("rtd", {{"r0", -100}})).error() == "kind \"rtd\": \"r0\" must be above zero, not -100");
}
