#include "base/names.hpp"

#include <string>

#include <catch2/catch.hpp>

using base::glob_match;
using base::nearest_name;

TEST_CASE("names that differ in the case of ASCII letters are one name, spelled as first seen") {
  base::NameTable names;
  const base::NameId first = names.intern("ADC_In");
  CHECK(names.intern("adc_iN") == first);
  CHECK(names.text(first) == "ADC_In");
  CHECK(names.size() == 1);
}

TEST_CASE("letters outside ASCII are not folded") {
  base::NameTable names;
  CHECK(names.intern("\xC3\x84") != names.intern("\xC3\xA4"));  // A and a with diaeresis
  CHECK(base::folded("[\xC3\x84Z@") == "[\xC3\x84z@");
}

TEST_CASE("a name that was never interned is not found, and looking for it does not make it") {
  base::NameTable names;
  names.intern("a");
  CHECK_FALSE(names.find("b"));
  CHECK(names.find("A"));
  CHECK(names.size() == 1);
}

TEST_CASE("ids and spellings survive the growth of the table") {
  base::NameTable names;
  for (int i = 0; i < 20000; ++i) names.intern("net_" + std::to_string(i));
  REQUIRE(names.size() == 20000);
  for (int i = 0; i < 20000; i += 97) {
    const std::string text = "NET_" + std::to_string(i);
    REQUIRE(names.find(text));
    CHECK(names.find(text)->value == static_cast<std::uint32_t>(i));
    CHECK(names.text(*names.find(text)) == "net_" + std::to_string(i));
  }
}

TEST_CASE("the empty name and names longer than a block of the table are names") {
  base::NameTable names;
  const std::string long_name(200'000, 'x');
  const base::NameId empty = names.intern("");
  const base::NameId big = names.intern(long_name);
  CHECK(names.text(empty).empty());
  CHECK(names.text(big) == long_name);
  CHECK(names.intern("") == empty);
}

TEST_CASE("names may hold any byte, zero included") {
  base::NameTable names;
  const std::string with_zero("a\0b", 3);
  CHECK(names.intern(with_zero) != names.intern("a"));
  CHECK(names.find(std::string("A\0B", 3)));
}

TEST_CASE("making room for names keeps those that are there") {
  base::NameTable names;
  const base::NameId a = names.intern("a");
  names.reserve(100'000);
  CHECK(names.intern("A") == a);
  CHECK(names.text(a) == "a");
}

TEST_CASE("in a glob only * and ? are special, and case is folded") {
  CHECK(glob_match("ADC_*", "adc_air"));
  CHECK(glob_match("ADC_?", "ADC_1"));
  CHECK(glob_match("*", ""));
  CHECK(glob_match("a*b*c", "a__b__b__c"));
  CHECK(glob_match("[ab]", "[AB]"));
  CHECK_FALSE(glob_match("ADC_?", "ADC_"));
  CHECK_FALSE(glob_match("ADC_?", "ADC_12"));
  CHECK_FALSE(glob_match("[ab]", "a"));
  CHECK_FALSE(glob_match("", "a"));
  CHECK_FALSE(glob_match("a*b", "a__bc"));
}

TEST_CASE("a glob of many stars on a long name ends soon") {
  CHECK_FALSE(glob_match("*a*a*a*a*a*a*a*a*b", std::string(5000, 'a')));
}

TEST_CASE("a slip of the pen finds the name that was meant") {
  CHECK(nearest_name("ADC_AIT", {"ADC_LIGHT", "ADC_AIR", "VBAT"}) == "ADC_AIR");
  CHECK(nearest_name("adc_air", {"ADC_AIR"}) == "ADC_AIR");
  CHECK(nearest_name("tolerence", {"volts", "tolerance"}) == "tolerance");
}

TEST_CASE("of two names equally near the first is offered") {
  CHECK(nearest_name("R11", {"R12", "R13"}) == "R12");
}

TEST_CASE("a name that is far from all is no slip of the pen") {
  CHECK(nearest_name("R1", {"ADC_AIR", "CX9"}).empty());
  CHECK(nearest_name("temperature", {"ohms", "volts"}).empty());
  CHECK(nearest_name("x", {}).empty());
  CHECK(nearest_name(std::string(1000, 'a'), {"a"}).empty());
}

TEST_CASE("nothing is no slip of the pen") {
  CHECK(nearest_name("", {"0", "a"}).empty());
}

TEST_CASE("case is folded at every place of a name, and no other byte is") {
  for (std::size_t size = 1; size <= 40; ++size) {
    std::string low(size, 'x');
    for (std::size_t at = 0; at < size; ++at) {
      for (int byte = 0; byte < 256; ++byte) {
        std::string one = low;
        one[at] = static_cast<char>(byte);
        CHECK(base::same_name(one, low) == (byte == 'x' || byte == 'X'));
        if (byte == '[' || byte == '@' || byte == 0xC1) {
          std::string other = one;
          other[at] = static_cast<char>(byte ^ 0x20);
          CHECK_FALSE(base::same_name(one, other));
        }
      }
    }
  }
  CHECK(base::same_name("", ""));
  CHECK_FALSE(base::same_name("abcdefgh", "abcdefghi"));
}

TEST_CASE("names of every length are found again in any case") {
  base::NameTable names;
  std::string text;
  for (std::size_t size = 0; size < 60; ++size, text += static_cast<char>('a' + size % 26)) {
    const base::NameId id = names.intern(text);
    std::string loud = text;
    for (char& c : loud) c = static_cast<char>(c - 0x20);
    names.prepare(loud);
    CHECK(names.intern(loud) == id);
    CHECK(names.size() == size + 1);
  }
}
