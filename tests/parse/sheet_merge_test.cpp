// Three places, same keys, later wins.
#include <catch2/catch.hpp>

#include "parse/sheet_reading.hpp"

using sheet_test::Messages;
using sheet_test::read_all;
using sheet_test::read_netlist;
using sheet_test::Reading;

TEST_CASE("places merge key by key, the later wins, and each value keeps its own place") {
  const Reading reading =
      read_all({{"a", "[converter.U1]\nbits = 10\nhigh = 5\ninputs = [\"A\", \"B\"]\n[rail.VCC]\nvolts = 5\n"},
                {"b", "converter.U1.bits = 12\n[rail.VDD]\nvolts = 3.3\n"},
                {"c", "[converter.U1]\ngain = 2\n"}});
  CHECK(reading.messages() == Messages{});
  REQUIRE(reading.sheet.converters.size() == 1);
  const auto& keys = reading.sheet.converters[0].keys;
  CHECK(keys.bits->value == 12);
  CHECK(reading.at(keys.bits->where) == "b:1:21");
  CHECK(std::get<double>(keys.high->value) == 5);
  CHECK(reading.at(keys.high->where) == "a:3:8");
  CHECK(keys.gain->value == 2);
  CHECK(reading.at(keys.gain->where) == "c:2:8");
  CHECK(reading.at(reading.sheet.converters[0].where) == "a:1:12");
  CHECK(reading.sheet.rails.size() == 2);
}

TEST_CASE("an array of a later place replaces the earlier one") {
  const Reading reading = read_all({{"a", "[converter.U1]\nbits = 10\nhigh = 5\ninputs = [\"A\", \"B\"]\n"},
                                    {"b", "converter.U1.inputs = [\"C\"]\n"}});
  REQUIRE(reading.sheet.converters.at(0).inputs.size() == 1);
  CHECK(reading.sheet.converters[0].inputs[0].value == "C");
  CHECK(reading.at(reading.sheet.converters[0].inputs[0].where) == "b:1:24");
}

TEST_CASE("names of nets and parts are one whatever their case, spelled as first declared") {
  const Reading reading = read_all({{"a", "[rail.Vcc]\nvolts = 5"}, {"b", "[rail.VCC]\nohms = 1"}});
  CHECK(reading.messages() == Messages{});
  REQUIRE(reading.sheet.rails.size() == 1);
  CHECK(reading.sheet.rails[0].net == "Vcc");
  CHECK(reading.sheet.rails[0].ohms->value == 1);
}

TEST_CASE("keys and groups are told apart by case") {
  CHECK(read_all({{"a", "[rail.A]\nvolts = 5\nVolts = 5"}}).messages() ==
        Messages{"3:1: unknown key \"Volts\" in [rail.A]; did you mean \"volts\"?"});
  CHECK(read_all({{"a", "[Rail.A]\nvolts = 5"}}).messages() ==
        Messages{"1:2: unknown table \"Rail\"; did you mean \"rail\"?"});
}

TEST_CASE("two tables of one place whose names differ in case only are an error") {
  CHECK(read_all({{"a", "[rail.Vcc]\nvolts = 5\n[rail.VCC]\nvolts = 3"}}).messages() ==
        Messages{"3:7: [rail.VCC] is declared twice: \"Vcc\" is the same name, whatever its case"});
}

TEST_CASE("a later place may replace a value of the wrong type") {
  const Reading reading = read_all({{"a", "rail.A = 5"}, {"b", "rail.A.volts = 5"}});
  CHECK(reading.messages() == Messages{});
  CHECK(reading.sheet.rails.at(0).volts->value == 5);
}

TEST_CASE("limits and levels of places merge by rule") {
  const Reading reading = read_all({{"a", "[limit]\nspan_use = 0.4\nrail_gap = 0.1"}, {"b", "limit.span_use = 0.6"}});
  REQUIRE(reading.sheet.limits.size() == 2);
  CHECK(reading.sheet.limits[0].limit.value == 0.6);
  CHECK(reading.at(reading.sheet.limits[0].limit.where) == "b:1:18");
  CHECK(reading.sheet.limits[1].limit.value == 0.1);
}

TEST_CASE("lines of a netlist that begin with *| are TOML, with the netlist's own lines and columns") {
  const Reading reading = read_netlist(
      "board\n*| [rail.VDD]\nR1 a b 10k\n*|volts = 3.3\n* | [rail.X]\n *| "
      "[rail.Y]\n*|[converter.U1]\n*|bits=12\n*|high=\"VDD\"\n"
      "*|inputs = [ # over several lines\nC1 a 0 1u\n*| \"A\",\n*| \"B\" ]\n.end\n");
  CHECK(reading.messages() == Messages{});
  REQUIRE(reading.sheet.rails.size() == 1);
  CHECK(reading.spot(reading.sheet.rails[0].where) == "VDD @ 2:10");
  CHECK(reading.spot(reading.sheet.rails[0].volts->where) == "3.3 @ 4:11");
  REQUIRE(reading.sheet.converters.at(0).inputs.size() == 2);
  CHECK(reading.spot(reading.sheet.converters[0].inputs[1].where) == "\"B\" @ 13:4");
}

TEST_CASE("places in a netlist hold with any line end, and behind letters beyond ASCII") {
  const Reading reading = read_netlist("board\r\n*|[rail.\"\xC2\xB5V\"] \r\n*|volts=3.3\r*|ohms=1\n");
  CHECK(reading.messages() == Messages{});
  REQUIRE(reading.sheet.rails.size() == 1);
  CHECK(reading.spot(reading.sheet.rails[0].where) == "\"\xC2\xB5V\" @ 2:9");
  CHECK(reading.spot(reading.sheet.rails[0].volts->where) == "3.3 @ 3:9");
  CHECK(reading.spot(reading.sheet.rails[0].ohms->where) == "1 @ 4:8");
}

TEST_CASE("*| counts at the beginning of a line only, the first line's included") {
  const Reading reading =
      read_netlist("*|[rail.A]\n*|volts = 1 # *| volts = 2\nR1 a b 1k *| x\n **|ohms = 1\n.end *|\r*|ohms = 3");
  CHECK(reading.messages() == Messages{});
  CHECK(reading.sheet.rails.at(0).volts->value == 1);
  CHECK(reading.sheet.rails.at(0).ohms->value == 3);
}

TEST_CASE("a netlist without declarations says nothing") {
  const Reading reading = read_netlist("board\nR1 a b 10k\n.end\n");
  CHECK(reading.messages() == Messages{});
  CHECK(reading.sheet.rails.empty());
}

TEST_CASE("a place with a syntax error leaves the others to be read, and no key counts as missing") {
  const Reading reading = read_all({{"a", "[converter.U1]\nbits = 12\nhigh = \n"},
                                    {"b", "[converter.U1]\ngain = 0\n[rail.VDD]\nohms = 1\nvlots = 3\n"}});
  CHECK(reading.messages() ==
        Messages{"a:3:8: this is not TOML: expected value, found the end of the line, in the key-value pair",
                 "b:2:8: this must be above zero, found the number 0",
                 "b:5:1: unknown key \"vlots\" in [rail.VDD]; did you mean \"volts\"?"});
}

TEST_CASE("no places give an empty sheet") {
  const Reading reading = read_all({});
  CHECK(reading.diagnostics.empty());
  CHECK(reading.sheet.converters.empty());
}
