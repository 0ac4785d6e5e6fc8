#include "base/text.hpp"

#include <limits>

#include <catch2/catch.hpp>

using base::number_text;
using base::printable;
using base::printable_short;
using base::si_text;

// The prefixes are those of the SI brochure, table 7.
TEST_CASE("a quantity is written with the SI prefix that leaves one to three digits before the point") {
  CHECK(si_text(4700, "ohm") == "4.7 kohm");
  CHECK(si_text(1e-7, "A") == "100 nA");
  CHECK(si_text(0, "V") == "0 V");
  CHECK(si_text(-3.3, "V") == "-3.3 V");
  CHECK(si_text(1e6, "ohm") == "1 Mohm");
  CHECK(si_text(1000, "ohm") == "1 kohm");
  CHECK(si_text(999, "ohm") == "999 ohm");
  CHECK(si_text(1e-15, "F") == "1 fF");
  CHECK(si_text(2.2e15, "ohm") == "2.2 Pohm");
}

TEST_CASE("a quantity that rounds up to the next prefix takes it") {
  CHECK(si_text(999.96, "ohm") == "1 kohm");
  CHECK(si_text(0.99999, "V") == "1 V");
  CHECK(si_text(-999.99e-9, "A") == "-1 uA");
}

TEST_CASE("a quantity keeps no more digits than asked for") {
  CHECK(si_text(12346, "ohm") == "12.35 kohm");
  CHECK(si_text(12345, "ohm", 2) == "12 kohm");
  CHECK(si_text(123456, "ohm", 2) == "120 kohm");
  CHECK(si_text(1.0 / 3, "V", 6) == "333.333 mV");
}

TEST_CASE("a quantity beyond the prefixes is written in scientific form") {
  CHECK(si_text(1e-18, "F") == "1.000e-18 F");
  CHECK(si_text(1e18, "ohm") == "1.000e+18 ohm");
  CHECK(si_text(std::numeric_limits<double>::denorm_min(), "V") == "4.941e-324 V");
  CHECK(si_text(std::numeric_limits<double>::max(), "V") == "1.798e+308 V");
}

TEST_CASE("a quantity without a unit ends in no blank") {
  CHECK(si_text(5, "") == "5");
  CHECK(si_text(0, "") == "0");
  CHECK(si_text(4700, "") == "4.7 k");
}

TEST_CASE("what is no number is written in words") {
  CHECK(si_text(std::numeric_limits<double>::infinity(), "V") == "inf V");
  CHECK(si_text(std::numeric_limits<double>::quiet_NaN(), "V") == "nan V");
}

TEST_CASE("a plain number has no trailing zeros and no prefix") {
  CHECK(number_text(-40) == "-40");
  CHECK(number_text(0) == "0");
  CHECK(number_text(-0.0) == "0");
  CHECK(number_text(7.031) == "7.031");
  CHECK(number_text(7.0) == "7");
  CHECK(number_text(9.99996) == "10");
  CHECK(number_text(0.00012346) == "0.0001235");
  CHECK(number_text(100) == "100");
  CHECK(number_text(0.5, 1) == "0.5");
}

TEST_CASE("a plain number shows all digits before the point, and no more after them") {
  CHECK(number_text(123456.7) == "123457");
  CHECK(number_text(248277.7) == "248278");
}

TEST_CASE("a plain number is scientific only beyond 1e-5 and 1e7") {
  CHECK(number_text(1e-5) == "0.00001");
  CHECK(number_text(9.9e-6) == "9.9e-06");
  CHECK(number_text(1e7) == "1e+07");
  CHECK(number_text(9'999'999) == "9999999");
}

TEST_CASE("text that is printable stays as it is") {
  CHECK(printable("R1 = 10k") == "R1 = 10k");
  CHECK(printable("\xC2\xB5s \xE2\x84\xA6 \xF0\x9F\x8C\xB1") ==
        "\xC2\xB5s \xE2\x84\xA6 \xF0\x9F\x8C\xB1");  // micro, ohm, plant
}

TEST_CASE("control characters are written as their bytes") {
  CHECK(printable("a\nb\tc") == "a\\x0ab\\x09c");
  CHECK(printable("\x1b[31mred") == "\\x1b[31mred");
  CHECK(printable(std::string("\0", 1)) == "\\x00");
  CHECK(printable("\x7f") == "\\x7f");
  CHECK(printable("\xC2\x9B") == "\\xc2\\x9b");  // CSI among the C1 controls
}

TEST_CASE("characters that turn or hide text are written as their bytes") {
  CHECK(printable("\xE2\x80\xAE") == "\\xe2\\x80\\xae");           // U+202E, right-to-left override
  CHECK(printable("\xE2\x81\xA6") == "\\xe2\\x81\\xa6");           // U+2066, left-to-right isolate
  CHECK(printable("\xE2\x80\x8B") == "\\xe2\\x80\\x8b");           // U+200B, zero width space
  CHECK(printable("\xE2\x81\xA0") == "\\xe2\\x81\\xa0");           // U+2060, word joiner
  CHECK(printable("\xEF\xBB\xBF") == "\\xef\\xbb\\xbf");           // U+FEFF
  CHECK(printable("\xF3\xA0\x81\x81") == "\\xf3\\xa0\\x81\\x81");  // U+E0041, a tag character
}

// RFC 3629 sections 3 and 4.
TEST_CASE("bytes that are not UTF-8 are written as their bytes") {
  CHECK(printable("\xff") == "\\xff");
  CHECK(printable("\xC3") == "\\xc3");
  CHECK(printable("\xC0\xAF") == "\\xc0\\xaf");                    // overlong
  CHECK(printable("\xE0\x80\xAF") == "\\xe0\\x80\\xaf");           // overlong
  CHECK(printable("\xED\xA0\x80") == "\\xed\\xa0\\x80");           // a surrogate
  CHECK(printable("\xF4\x90\x80\x80") == "\\xf4\\x90\\x80\\x80");  // past U+10FFFF
  CHECK(printable("\xC3\x41") ==
        "\\xc3"
        "A");
}

TEST_CASE("what is printable stays the same when it is made printable again") {
  const std::string once = printable("\x1b\xff\xE2\x80\xAE\\");
  CHECK(printable(once) == once);
}

TEST_CASE("a text that is short enough is not cut") {
  CHECK(printable_short("12345", 5) == "12345");
  CHECK(printable_short("", 5).empty());
}

TEST_CASE("a long text is cut in its middle") {
  CHECK(printable_short("123456789abcdef", 9) == "123456...def");
}

TEST_CASE("a cut never splits a character") {
  // Four characters of three bytes: a cut after 6 of 9 bytes falls between characters, after 5 of 8 it would not.
  const std::string ohms = "\xE2\x84\xA6\xE2\x84\xA6\xE2\x84\xA6\xE2\x84\xA6";
  CHECK(printable_short(ohms, 9) == "\xE2\x84\xA6\xE2\x84\xA6...\xE2\x84\xA6");
  CHECK(printable_short(ohms, 8) == "\xE2\x84\xA6...\xE2\x84\xA6");
}
