// Every key of rails, converters, inputs, parts, limits and levels, with its value and its place.
#include <catch2/catch.hpp>

#include "parse/sheet_reading.hpp"

using sheet_test::Messages;
using sheet_test::read;
using sheet_test::Reading;

namespace {

// The converter that is complete without the key under test.
std::string converter_with(const std::string& line) {
  return "[converter.U1]\nbits = 12\nhigh = 3.3\ninputs = [\"ADC_1\"]\n" + line + "\n";
}

model::ConverterKeys keys_with(const std::string& line) {
  const Reading reading = read(converter_with(line));
  INFO(line);
  CHECK(reading.messages() == Messages{});
  REQUIRE(reading.sheet.converters.size() == 1);
  return reading.sheet.converters[0].keys;
}

std::string end_text(const model::Maybe<model::RangeEnd>& end) {
  if (!end) return "none";
  const auto* volts = std::get_if<double>(&end->value);
  return volts != nullptr ? fmt::format("{} V", *volts) : "net " + std::get<std::string>(end->value);
}

std::string error_text(const model::Maybe<model::ConverterError>& error) {
  return error ? fmt::format("{} {}", error->value.value, error->value.in_lsb ? "LSB" : "V") : "none";
}

}  // namespace

TEST_CASE("a rail has volts and ohms, each with its place") {
  const Reading reading = read("[rail.\"+3V3\"]\nvolts = \"3.3 V\"\nohms = \"0R5\"\n[rail.VB]\nvolts=-5");
  CHECK(reading.messages() == Messages{});
  REQUIRE(reading.sheet.rails.size() == 2);
  const model::RailDeclaration& rail = reading.sheet.rails[0];
  CHECK(rail.net == "+3V3");
  CHECK(reading.spot(rail.where) == "\"+3V3\" @ 1:7");
  CHECK(rail.volts->value == 3.3);
  CHECK(reading.spot(rail.volts->where) == "\"3.3 V\" @ 2:9");
  CHECK(rail.ohms->value == 0.5);
  CHECK(reading.spot(rail.ohms->where) == "\"0R5\" @ 3:8");
  CHECK(reading.sheet.rails[1].volts->value == -5);
  CHECK_FALSE(reading.sheet.rails[1].ohms.has_value());
}

TEST_CASE("a rail needs no volts where a sensor sweeps it") {
  CHECK(read("[rail.VIN]\nohms = 0.1\n[sensor.vin]\nkind = \"voltage\"\nfrom = 9\nto = 16").messages() == Messages{});
}

TEST_CASE("a converter keeps its name, its inputs and their number") {
  const Reading reading =
      read("[converter.U1]\nbits = 12\nhigh = 3.3\ninputs = [\"ADC_*\", \"AIN0\"]\nexpect_inputs = 8\n");
  CHECK(reading.messages() == Messages{});
  const model::ConverterDeclaration& converter = reading.sheet.converters.at(0);
  CHECK(converter.name == "U1");
  CHECK(reading.spot(converter.where) == "U1 @ 1:12");
  CHECK(converter.keys.bits->value == 12);
  CHECK(reading.spot(converter.keys.bits->where) == "12 @ 2:8");
  REQUIRE(converter.inputs.size() == 2);
  CHECK(converter.inputs[0].value == "ADC_*");
  CHECK(reading.spot(converter.inputs[0].where) == "\"ADC_*\" @ 4:11");
  CHECK(converter.inputs[1].value == "AIN0");
  CHECK(reading.spot(converter.inputs[1].where) == "\"AIN0\" @ 4:20");
  CHECK(converter.expect_inputs->value == 8);
  CHECK(reading.spot(converter.expect_inputs->where) == "8 @ 5:17");
}

TEST_CASE("each number of a converter is read in its own unit") {
  using Keys = model::ConverterKeys;
  struct Row {
    const char* line;
    model::Maybe<double> Keys::*field;
    double value;
  };
  for (const Row& row :
       std::initializer_list<Row>{{"gain = 2.5", &Keys::gain, 2.5},
                                  {"leakage = \"100nA\"", &Keys::leakage, 1e-7},
                                  {"leakage = 0", &Keys::leakage, 0},
                                  {"input_resistance = \"10M\"", &Keys::input_resistance, 1e7},
                                  {"sample_capacitance = \"8pF\"", &Keys::sample_capacitance, 8e-12},
                                  {"switch_resistance = \"1k\"", &Keys::switch_resistance, 1000},
                                  {"acquisition_time = \"2.5us\"", &Keys::acquisition_time, 2.5e-6},
                                  {"sample_rate = \"1k\"", &Keys::sample_rate, 1000},
                                  {"pin_beyond = 0.3", &Keys::pin_beyond, 0.3},
                                  {"pin_current = \"5mA\"", &Keys::pin_current, 5e-3},
                                  {"injection_total = \"25 mA\"", &Keys::injection_total, 25e-3},
                                  {"gain_error = \"0.1%\"", &Keys::gain_error, 1e-3},
                                  {"reference_tolerance = \"50 ppm\"", &Keys::reference_tolerance, 50e-6},
                                  {"average = 16", &Keys::average, 16}}) {
    const auto keys = keys_with(row.line);
    REQUIRE((keys.*row.field).has_value());
    CHECK((keys.*row.field)->value == row.value);
  }
}

TEST_CASE("an error of a converter is in LSB or in volts") {
  CHECK(error_text(keys_with("offset_error = \"2 LSB\"").offset_error) == "2 LSB");
  CHECK(error_text(keys_with("offset_error = \"5 mV\"").offset_error) == "0.005 V");
  CHECK(error_text(keys_with("inl = \"1.5LSB\"").inl) == "1.5 LSB");
  CHECK(error_text(keys_with("noise = \"1 LSB\"").noise) == "1 LSB");
}

TEST_CASE("an end of the range is volts or a net, and a text that is a net's usual name is the net") {
  const auto low_text = [](const std::string& low) { return end_text(keys_with("low = " + low).low); };
  CHECK(low_text("0") == "0 V");
  CHECK(low_text("-1.25") == "-1.25 V");
  CHECK(low_text("\"2.5 V\"") == "2.5 V");
  CHECK(low_text("\"2.5\"") == "2.5 V");
  CHECK(low_text("\"100 mV\"") == "0.1 V");
  CHECK(low_text("\"1e-1\"") == "0.1 V");
  CHECK(low_text("\"AGND\"") == "net AGND");
  CHECK(low_text("\"+3V3\"") == "net +3V3");
  CHECK(low_text("\"3V3\"") == "net 3V3");
  CHECK(low_text("\"VREF+\"") == "net VREF+");
}

TEST_CASE("an end of the range is a net where a declared rail has its name, even if it reads as a voltage") {
  const Reading reading = read("[rail.\"5V\"]\nvolts = 5\n[converter.U1]\nbits = 12\nhigh = \"5v\"\ninputs = [\"A\"]");
  CHECK(reading.messages() == Messages{});
  CHECK(end_text(reading.sheet.converters.at(0).keys.high) == "net 5v");
}

TEST_CASE("keys that no rule of this version uses are read and listed with what is not checked") {
  const Reading reading = read(
      converter_with("supply = \"VDD\"\nsample_rate = 1000\ninl = \"1 LSB\"\npin_current = 0.005\nnoise = \"1 LSB\"\n"
                     "average = 4\nleakage = \"1nA\"\noffset_error = \"1 LSB\"\n[input.ADC_1]\ngain_error = \"1%\""));
  CHECK(reading.messages() == Messages{});
  Messages unused;
  for (const auto& key : reading.sheet.unused)
    unused.push_back(fmt::format("{}: {} ({})", reading.at(key.where), key.key, key.missing));
  CHECK(unused == Messages{"5:1: converter.U1.supply (pin stress)", "6:1: converter.U1.sample_rate (settling)",
                           "8:1: converter.U1.pin_current (pin stress)", "7:1: converter.U1.inl (accuracy)",
                           "9:1: converter.U1.noise (noise)", "10:1: converter.U1.average (noise)",
                           "14:1: input.ADC_1.gain_error (accuracy)"});
  CHECK(reading.sheet.converters.at(0).keys.supply->value == "VDD");
}

TEST_CASE("an input takes converter keys, limits and levels of its own") {
  const Reading reading = read(
      "[input.\"ADC_*\"]\nbits = 10\nlow = \"AGND\"\nleakage = \"1uA\"\nlimit.span_use = 0.3\nlevel.rail_gap = "
      "\"off\"\n"
      "[input.B.limit]\nload_error = \"2 LSB\"");
  CHECK(reading.messages() == Messages{});
  REQUIRE(reading.sheet.inputs.size() == 2);
  const model::InputDeclaration& input = reading.sheet.inputs[0];
  CHECK(input.name == "ADC_*");
  CHECK(reading.spot(input.where) == "\"ADC_*\" @ 1:8");
  CHECK(input.keys.bits->value == 10);
  CHECK(end_text(input.keys.low) == "net AGND");
  CHECK(input.keys.leakage->value == 1e-6);
  REQUIRE(input.limits.size() == 1);
  CHECK(input.limits[0].rule == "span-use");
  CHECK(input.limits[0].limit.value == 0.3);
  CHECK(reading.spot(input.limits[0].limit.where) == "0.3 @ 5:18");
  REQUIRE(input.levels.size() == 1);
  CHECK(input.levels[0].rule == "rail-gap");
  CHECK_FALSE(input.levels[0].level.value.has_value());
  CHECK(reading.sheet.inputs[1].limits.at(0).limit.value == 2);
}

TEST_CASE("limits are in their rule's unit") {
  const Reading reading = read(
      "[limit]\nspan_use = \"40%\"\nspan_efficiency = 0.7\nrail_gap = 0.03\noff_scale = 0.001\nambiguous_tap = 0.2\n"
      "load_error = 3\nengine_gap = \"0.1 LSB\"");
  CHECK(reading.messages() == Messages{});
  Messages limits;
  for (const auto& setting : reading.sheet.limits) {
    limits.push_back(fmt::format("{} {} @ {}", setting.rule, setting.limit.value, reading.at(setting.limit.where)));
  }
  CHECK(limits == Messages{"span-use 0.4 @ 2:12", "span-efficiency 0.7 @ 3:19", "rail-gap 0.03 @ 4:12",
                           "off-scale 0.001 @ 5:13", "ambiguous-tap 0.2 @ 6:17", "load-error 3 @ 7:14",
                           "engine-gap 0.1 @ 8:14"});
}

TEST_CASE("any rule may have a level, or be off") {
  const Reading reading =
      read("[level]\nspan_use = \"error\"\nno_sensor = \"note\"\nload_error = \"warning\"\nsuspect_value = \"off\"");
  CHECK(reading.messages() == Messages{});
  Messages levels;
  for (const auto& setting : reading.sheet.levels) {
    const auto& level = setting.level.value;
    levels.push_back(fmt::format("{} {} @ {}", setting.rule, level ? base::level_text(*level) : "off",
                                 reading.at(setting.level.where)));
  }
  CHECK(levels == Messages{"span-use error @ 2:12", "no-sensor note @ 3:13", "load-error warning @ 4:14",
                           "suspect-value off @ 5:17"});
}

TEST_CASE("a part has a stand-in, a resistance and a role") {
  const Reading reading = read(
      "[part.U3]\nmodel = \"open\"\n[part.\"R*\"]\nrole = \"load\"\n[part.FB1]\nmodel = \"resistor\"\nohms = \"0.2 "
      "ohm\"\nrole = \"arm\"");
  CHECK(reading.messages() == Messages{});
  REQUIRE(reading.sheet.parts.size() == 3);
  CHECK(reading.sheet.parts[0].model->value == model::StandIn::open);
  CHECK(reading.spot(reading.sheet.parts[0].model->where) == "\"open\" @ 2:9");
  CHECK(reading.sheet.parts[1].name == "R*");
  CHECK(reading.sheet.parts[1].role->value == model::Role::load);
  CHECK_FALSE(reading.sheet.parts[1].model.has_value());
  CHECK(reading.sheet.parts[2].model->value == model::StandIn::resistor);
  CHECK(reading.sheet.parts[2].ohms->value == 0.2);
  CHECK(reading.sheet.parts[2].role->value == model::Role::arm);
}

TEST_CASE("what a bare M means can be declared, and is by size where it is not") {
  CHECK(read("").sheet.bare_m.value == model::BareM::by_size);
  CHECK(read("[reading]\nm = \"milli\"").sheet.bare_m.value == model::BareM::milli);
  const Reading reading = read("reading.m = \"mega\"");
  CHECK(reading.sheet.bare_m.value == model::BareM::mega);
  CHECK(reading.spot(reading.sheet.bare_m.where) == "\"mega\" @ 1:13");
}

TEST_CASE("tables are kept in the order of the text, not of the alphabet") {
  const Reading reading = read("[rail.Z]\nvolts = 1\n[rail.A]\nvolts = 2\n[rail.M]\nvolts = 3");
  CHECK(reading.sheet.rails.at(0).net == "Z");
  CHECK(reading.sheet.rails.at(1).net == "A");
  CHECK(reading.sheet.rails.at(2).net == "M");
}
