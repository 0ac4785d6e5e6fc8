// Any sequence of bytes may come.
#include <random>

#include <catch2/catch.hpp>

#include "parse/sheet_reading.hpp"

using sheet_test::read;
using sheet_test::read_netlist;
using sheet_test::Reading;

namespace {

constexpr const char* good =
    "[rail.\"+3V3\"]\nvolts = 3.3\n[converter.U1]\nbits = 12\nlow = 0\nhigh = \"+3V3\"\ninputs = [\"ADC_*\"]\nleakage "
    "= \"100nA\"\n"
    "offset_error = \"2 LSB\"\n[input.ADC_1]\nlimit.span_use = 0.3\n[sensor.RT1]\nkind = \"ntc\"\nr25 = \"10k\"\nbeta "
    "= 3435\nfrom = -40\n"
    "to = 125\nbetween = [\"A\", \"0\"]\n[part.R7]\nrole = \"arm\"\n[level]\nrail_gap = \"off\"\n[reading]\nm = "
    "\"mega\"\n";

// Every place lies in the text and can be drawn.
void check_places(const Reading& reading) {
  for (const auto& diagnostic : reading.diagnostics) {
    REQUIRE(diagnostic.where.valid());
    REQUIRE(diagnostic.where.begin.offset + std::size_t{diagnostic.where.length} <=
            reading.sources[diagnostic.where.begin.source].bytes.size());
    REQUIRE_FALSE(source::draw(reading.sources, diagnostic).empty());
  }
}

std::string netlist_of(std::string toml) {
  for (std::size_t at = 0; at != std::string::npos; at = toml.find('\n', at)) toml.insert(at == 0 ? 0 : ++at, "*|");
  return toml;
}

}  // namespace

TEST_CASE("random bytes are refused or read, at a place inside the text") {
  std::mt19937 random(20240512);
  std::size_t refused = 0;
  for (int run = 0; run < 2000; ++run) {
    std::string bytes(random() % 64, '\0');
    for (char& byte : bytes) byte = static_cast<char>(random() % 256);
    const Reading reading = run % 2 ? read(bytes) : read_netlist("*|" + bytes);
    check_places(reading);
    refused += reading.diagnostics.empty() ? 0U : 1U;
  }
  CHECK(refused > 1500);
}

TEST_CASE("good declarations with a few bytes changed are refused or read, at a place inside the text") {
  std::mt19937 random(20240513);
  const std::string likely = "[]{}=.,\"'#\n\r \t0123456789-+eE_abklmnu\\\x80\xC2\xB5";
  std::size_t refused = 0;
  for (int run = 0; run < 3000; ++run) {
    std::string bytes = good;
    for (std::size_t edits = 1 + random() % 4; edits > 0; --edits) {
      const std::size_t at = random() % bytes.size();
      const char byte = likely[random() % likely.size()];
      if (random() % 3 == 0)
        bytes.erase(at, 1 + random() % 5);
      else if (random() % 2 == 0)
        bytes.insert(at, 1, byte);
      else
        bytes[at] = byte;
    }
    const Reading reading = run % 2 ? read(bytes) : read_netlist(netlist_of(bytes));
    check_places(reading);
    refused += reading.diagnostics.empty() ? 0U : 1U;
  }
  CHECK(refused > 1000);
}

TEST_CASE("the good declarations that are changed above are good, in a file and in a netlist") {
  CHECK(read(good).messages() == sheet_test::Messages{});
  CHECK(read_netlist(netlist_of(good)).messages() == sheet_test::Messages{});
}

TEST_CASE("deep nesting, long keys and long lines are refused without a crash") {
  std::string chain = "a";
  for (int i = 0; i < 100000; ++i) chain += ".a";
  CHECK(read(chain + " = 1").messages() == sheet_test::Messages{"1:1: more than 100 points in one line"});
  CHECK(read("[" + chain + "]").messages() == sheet_test::Messages{"1:1: more than 100 points in one line"});
  CHECK(read("a = " + std::string(100000, '[')).messages().size() == 1);
  const std::string shorter = chain.substr(0, 101);
  CHECK(read(shorter + " = 1").messages() ==
        sheet_test::Messages{"1:35: more than 16 tables inside one another", "1:1: unknown table \"a\""});
  std::string numbers = "[part.A]\nswing = [0.5";
  for (int i = 0; i < 1000; ++i) numbers += ", 0.5, -1.5e3";
  CHECK(read(numbers + "]").messages() ==
        sheet_test::Messages{"2:1: \"swing\" in [part.A] is not supported by this version"});
  std::string half = "a";
  for (int i = 0; i < 50000; ++i) half += " .1.1e.1";
  CHECK(read(half + " = 1").messages() == sheet_test::Messages{"1:1: more than 100 points in one line"});
  std::string nested = "a = ";
  for (int i = 0; i < 14; ++i) nested += "[{" + shorter + " =\n";
  CHECK(read(nested).messages().size() == 1);
  std::string tables = "a = ";
  for (int i = 0; i < 50000; ++i) tables += "{a.a.a=";
  CHECK(read(tables).messages().size() == 1);
  CHECK(read("rail.A.volts = \"" + std::string(10'000'000, '9') + "\"").messages().size() == 1);
  CHECK(read(std::string(10'000'000, 'k')).messages().size() == 1);
}

TEST_CASE("a file of one kind of byte is refused or empty") {
  for (int byte = 0; byte < 256; ++byte) {
    for (const std::size_t length : {1U, 2U, 3U, 100U}) {
      const Reading reading = read(std::string(length, static_cast<char>(byte)));
      check_places(reading);
    }
  }
}
