// What belongs to a wider version is refused at its place, and never ignored.
#include <catch2/catch.hpp>

#include "parse/sheet_reading.hpp"

using sheet_test::Messages;
using sheet_test::read;

namespace {

constexpr const char* converter = "[converter.U1]\nbits = 12\nhigh = 3.3\ninputs = [\"A\"]\n";
constexpr const char* thermistor = "[sensor.RT1]\nkind = \"ntc\"\nr25 = 1000\nbeta = 3000\nfrom = 0\nto = 50\n";

// The one message for `line` put behind a table that is complete without it, from the column on.
std::string refusal(const std::string& table, const std::string& line) {
  const auto messages = read(table + line).messages();
  INFO(line);
  REQUIRE(messages.size() == 1);
  return messages[0].substr(messages[0].find(':') + 1);
}

std::string key_in(const std::string& table, const std::string& key) {
  return fmt::format("1: \"{}\" in [{}] is not supported by this version", key, table);
}

}  // namespace

TEST_CASE("tables of a wider version are refused") {
  for (const char* name : {"source.EXC", "extra.LEADS", "mode.HOT", "tolerance", "board"}) {
    const std::string group = std::string(name).substr(0, std::string(name).find('.'));
    CHECK(read(fmt::format("[{}]\nx = 1", name)).messages() ==
          Messages{fmt::format("1:2: [{}] is not supported by this version", group)});
  }
  CHECK(read("[[waiver]]\nrule = \"span-use\"\nuntil = 2027-06-30").messages() ==
        Messages{"1:3: [waiver] is not supported by this version"});
}

TEST_CASE("keys of a wider version are refused in rails, converters, inputs and parts") {
  CHECK(refusal("[rail.A]\nvolts = 5\n", "tolerance = \"1%\"") == key_in("rail.A", "tolerance"));
  CHECK(refusal("[rail.A]\nvolts = 5\n", "follows = \"+5V\"") == key_in("rail.A", "follows"));
  CHECK(refusal(converter, "common_mode = [0.5, 2.8]") == key_in("converter.U1", "common_mode"));
  CHECK(refusal("[input.A]\n", "skip = \"reviewed by hand\"") == key_in("input.A", "skip"));
  CHECK(refusal("[input.A]\n", "driven = { from = 0.3, to = 2.7 }") == key_in("input.A", "driven"));
  for (const char* key : {"in", "out", "swing", "offset", "bias", "common", "channels", "pairs", "leakage", "tolerance",
                          "tc", "watts", "volts", "insulation"}) {
    CHECK(refusal("[part.U3]\n", fmt::format("{} = 1", key)) == key_in("part.U3", key));
  }
}

TEST_CASE("keys of a wider version are refused in sensors") {
  for (const char* key : {"resolution",
                          "tolerance",
                          "beta_tolerance",
                          "dissipation",
                          "duty",
                          "detect_fault",
                          "needs_ac",
                          "points",
                          "class",
                          "coefficients",
                          "ohms",
                          "taper",
                          "end_ohms",
                          "siemens_per_newton",
                          "siemens_at_zero",
                          "gauge_factor",
                          "temperature_coefficient",
                          "a1",
                          "a2",
                          "ohms_at_one",
                          "exponent",
                          "file",
                          "interpolate",
                          "state",
                          "into"}) {
    CHECK(refusal(thermistor, fmt::format("{} = 1", key)) == key_in("sensor.RT1", key));
  }
  CHECK(refusal(thermistor, "accuracy = \"10%\"") ==
        "12: an accuracy in percent of the reading is not supported by this version");
  CHECK(refusal(thermistor, "accuracy = [{ from = 0, to = 50, accuracy = 0.3 }]") ==
        "12: an accuracy in bands is not supported by this version");
}

TEST_CASE("kinds of a wider version are refused") {
  for (const char* kind :
       {"potentiometer", "force", "strain", "silicon", "power", "table", "formula", "steps", "current"}) {
    CHECK(read(fmt::format("[sensor.S]\nkind = \"{}\"\nohms = 5", kind)).messages() ==
          Messages{fmt::format("2:8: kind \"{}\" is not supported by this version", kind)});
  }
}

TEST_CASE("stand-ins of a wider version are refused") {
  for (const char* model : {"follower", "amplifier", "switch", "mux"}) {
    CHECK(read(fmt::format("[part.U3]\nmodel = \"{}\"\nohms = 80", model)).messages() ==
          Messages{fmt::format("2:9: model \"{}\" is not supported by this version", model)});
  }
}

TEST_CASE("differential pairs are refused") {
  CHECK(read("[converter.U1]\nbits = 12\nhigh = 3.3\ninputs = [{plus = \"AIN_P\", minus = \"AIN_N\"}, \"B\"]")
            .messages() == Messages{"4:11: a differential pair is not supported by this version"});
}

TEST_CASE("limits and levels of rules of a wider version are refused") {
  for (const char* rule : {"missing_tolerance", "settling", "resolution", "accuracy", "supply_tracking", "self_heating",
                           "part_power", "part_voltage", "fault_band", "pin_stress", "common_mode", "one_to_one",
                           "state_gap", "corner_frequency", "noise", "dc_on_sensor", "touch_voltage", "stale_waiver"}) {
    CHECK(refusal("[limit]\n", fmt::format("{} = 1", rule)) == key_in("limit", rule));
    CHECK(refusal("[level]\n", fmt::format("{} = \"off\"", rule)) == key_in("level", rule));
    CHECK(refusal("[input.A]\n", fmt::format("limit.{} = 1", rule)) ==
          fmt::format("7: \"{}\" in [input.A.limit] is not supported by this version", rule));
  }
}
