// [sensor.NAME]: the keys that all kinds share, and those of each kind in the table of sensor/.
#include <catch2/catch.hpp>

#include "parse/sheet_reading.hpp"
#include "sensor/law.hpp"

using sheet_test::Messages;
using sheet_test::read;
using sheet_test::Reading;

namespace {

std::string setting_text(const model::SensorDeclaration& sensor) {
  std::string text;
  for (const auto& setting : sensor.settings) {
    const auto* number = std::get_if<double>(&setting.value);
    text += fmt::format("{}={} ", setting.key,
                        number != nullptr ? fmt::format("{}", *number) : std::get<std::string>(setting.value));
  }
  return text;
}

}  // namespace

TEST_CASE("a thermistor has a kind, a law and a range, each with its place") {
  const Reading reading = read(
      "[sensor.RT1]\nkind = \"ntc\"\nr25 = \"10k\"\nbeta = \"3435 K\"\nfrom = \"-40 degC\"\nto = 125\naccuracy = "
      "2.0\nspacing = \"log\"");
  CHECK(reading.messages() == Messages{"5:8: a sweep with spacing \"log\" must begin above zero, found -40"});
  const model::SensorDeclaration& sensor = reading.sheet.sensors.at(0);
  CHECK(sensor.name == "RT1");
  CHECK(reading.spot(sensor.where) == "RT1 @ 1:9");
  CHECK(sensor.kind.value == "ntc");
  CHECK(reading.spot(sensor.kind.where) == "\"ntc\" @ 2:8");
  CHECK(setting_text(sensor) == "r25=10000 beta=3435 ");
  CHECK(reading.spot(sensor.settings.at(1).where) == "\"3435 K\" @ 4:8");
  CHECK(sensor.from->value == -40);
  CHECK(reading.spot(sensor.from->where) == "\"-40 degC\" @ 5:8");
  CHECK(sensor.to->value == 125);
  CHECK(sensor.accuracy->value == 2);
  CHECK(reading.spot(sensor.accuracy->where) == "2.0 @ 7:12");
  CHECK(sensor.spacing->value == model::Spacing::logarithmic);
  CHECK_FALSE(sensor.between.has_value());
}

TEST_CASE("each kind takes its range in the unit of its measurand, and its own keys") {
  const Reading reading = read(
      "[sensor.A]\nkind = \"ntc\"\na = 1.1e-3\nb = 2.4e-4\nc = 7e-8\nfrom = -40\nto = \"85 degC\"\n"
      "[sensor.B]\nkind = \"rtd\"\nr0 = 1000\nfrom = -50\nto = 300\naccuracy = \"0.5 K\"\n"
      "[sensor.C]\nkind = \"photoresistor\"\nohms_at_10lx = \"15k\"\ngamma = 0.7\nfrom = 1\nto = \"10 klx\"\nspacing = "
      "\"linear\"\n"
      "[sensor.VIN]\nkind = \"voltage\"\nfrom = \"9 V\"\nto = 16\naccuracy = \"50 mV\"\n"
      "[sensor.X1]\nkind = \"parameter\"\nsweep = \"T\"\nfrom = \"-10\"\nto = 60\n"
      "[sensor.LEAD]\nkind = \"rtd\"\nr0 = 100\nfrom = 0\nto = 50\nbetween = [\"N1\", \"0\"]\n");
  CHECK(reading.messages() == Messages{});
  const auto& sensors = reading.sheet.sensors;
  REQUIRE(sensors.size() == 6);
  CHECK(setting_text(sensors[0]) == "a=0.0011 b=0.00024 c=7e-08 ");
  CHECK(sensors[0].to->value == 85);
  CHECK(setting_text(sensors[1]) == "r0=1000 ");
  CHECK(sensors[1].accuracy->value == 0.5);
  CHECK(setting_text(sensors[2]) == "ohms_at_10lx=15000 gamma=0.7 ");
  CHECK(sensors[2].to->value == 10000);
  CHECK(sensors[2].spacing->value == model::Spacing::linear);
  CHECK(sensors[3].from->value == 9);
  CHECK(sensors[3].accuracy->value == 0.05);
  CHECK(sensors[4].sweep->value == "T");
  CHECK(reading.spot(sensors[4].sweep->where) == "\"T\" @ 28:9");
  CHECK(sensors[4].from->value == -10);
  REQUIRE(sensors[5].between.has_value());
  CHECK(sensors[5].between->first.value == "N1");
  CHECK(reading.spot(sensors[5].between->second.where) == "\"0\" @ 36:18");
}

TEST_CASE("every key that a kind's table lists is taken, and no key of another kind") {
  for (const sensor::Kind& kind : sensor::kinds()) {
    for (const sensor::Kind& other : sensor::kinds()) {
      for (const sensor::Key& key : other.keys) {
        const auto takes = [&] {
          for (const sensor::Key& own : kind.keys) {
            if (own.name == key.name) return true;
          }
          return false;
        };
        const Reading reading =
            read(fmt::format("[sensor.S]\n{} = 1\nkind = \"{}\"\nfrom = 1\nto = 2", key.name, kind.name));
        const std::string refusal =
            fmt::format("2:1: \"{}\" is a key of kind \"{}\", not of \"{}\"", key.name, other.name, kind.name);
        const auto messages = reading.messages();
        INFO(kind.name << " " << key.name);
        CHECK((std::find(messages.begin(), messages.end(), refusal) == messages.end()) == takes());
      }
    }
  }
}

TEST_CASE("a law that cannot be is told at the key that makes it so") {
  CHECK(read("[sensor.RT1]\nkind = \"ntc\"\nr25 = -10\nbeta = 3435\nfrom = 0\nto = 50").messages().size() == 1);
  const auto at = [](const std::string& toml) {
    const auto messages = read(toml).messages();
    return messages.size() == 1 ? messages[0].substr(0, messages[0].find(": "))
                                : fmt::format("{} messages", messages.size());
  };
  CHECK(at("[sensor.RT1]\nkind = \"ntc\"\nr25 = -10\nbeta = 3435\nfrom = 0\nto = 50") == "3:7");
  CHECK(at("[sensor.RT1]\nkind = \"ntc\"\nbeta = 3435\nfrom = 0\nto = 50") == "1:9");
  CHECK(at("[sensor.RT1]\nkind = \"rtd\"\nr0 = 100\nfrom = -300\nto = 50") == "4:8");
  CHECK(at("[sensor.RT1]\nkind = \"rtd\"\nr0 = 100\nfrom = -30\nto = 900") == "5:6");
}
