// Lines, comments, continuations, words.
#include <catch2/catch.hpp>

#include "netlist_reading.hpp"

using parse_test::NetlistReading;
using parse_test::one;
using Said = std::vector<std::string>;

TEST_CASE("netlist lines: the first line is the title, and no card") {
  const NetlistReading reading("R0 is what we call this board\nR1 a b 1\n");
  CHECK(reading.top().elements.size() == 1);
  CHECK(reading.fates() == "1 0 0 0");
  CHECK(reading.said().empty());
  CHECK(NetlistReading(".title R1 a b 1\nR2 a b 1\n").fates() == "1 0 0 0");
}

TEST_CASE("netlist lines: a title that looks like an element or a dot card is told, and stays the title") {
  const NetlistReading reading("R1 a b 10k\nR2 a b 1\n");
  CHECK(reading.top().elements.size() == 1);
  CHECK(reading.said() == Said{"t.cir:1:1: note: SPICE takes the first line as the title: this card is not read; put a "
                               "title line before it"});
  CHECK(NetlistReading(".param x=1\n").said().size() == 1);
  CHECK(NetlistReading("R2 board revision\n").said().empty());
  CHECK(NetlistReading("Divider for the greenhouse\n").said().empty());
}

TEST_CASE("netlist lines: LF, CR LF and lone CR end lines alike") {
  for (const std::string end : {"\n", "\r\n", "\r"}) {
    const NetlistReading reading("title" + end + "R1 a b" + end + "+ 10k" + end + end + "R2 c d 1" + end + "Rx e" +
                                 end);
    CHECK(reading.element("R1") == "r R1(a b) = 10000");
    CHECK(reading.element("R2") == "r R2(c d) = 1");
    CHECK(reading.said() == Said{"t.cir:6:1: error: a resistor needs two nodes and a value"});
  }
}

TEST_CASE("netlist lines: a byte order mark before the title is no part of it") {
  const NetlistReading reading("\xEF\xBB\xBFtitle\nR1 a b 1\n");
  CHECK(reading.fates() == "1 0 0 0");
  CHECK(reading.said().empty());
}

TEST_CASE("netlist lines: comments of all kinds hold no card") {
  const NetlistReading reading(
      "title\n* comment\n  * after blanks\n*| bits = 12\n; line\n$ line\n// line\n"
      "R1 a b 1 ; R9 a b\nR2 a b 2;3\nR3 a b 3 $ 4\nR4 a b 4 // 5\nR5 a$b c//d 5\n");
  CHECK(reading.fates() == "5 0 0 0");
  CHECK(reading.element("R1") == "r R1(a b) = 1");
  CHECK(reading.element("R2") == "r R2(a b) = 2");
  CHECK(reading.element("R3") == "r R3(a b) = 3");
  CHECK(reading.element("R4") == "r R4(a b) = 4");
  CHECK(reading.element("R5") == "r R5(a$b c//d) = 5");
  CHECK(reading.said().empty());
}

TEST_CASE("netlist lines: a line that SPICE would run is told once and skipped, also inside a card") {
  const NetlistReading reading("title\n*# shell\nR1 a\n*# again\n+ b 1\n");
  CHECK(reading.element("R1") == "r R1(a b) = 1");
  CHECK(reading.said() ==
        Said{"t.cir:2:1: note: SPICE runs a line that begins with *# as a command; it is skipped here",
             "t.cir:4:1: note: SPICE runs a line that begins with *# as a command; it is skipped here"});
}

TEST_CASE("netlist lines: a card goes on behind comments and empty lines, with + glued to the word or not") {
  CHECK(one("R1 a ; one\n* two\n\n   \n$ three\n+b\n+\n + 4.7k $ four") == "r R1(a b) = 4700");
  CHECK(one("R1 a b {1 +\n* comment {\n+ 2 ; why }\n+ *3}") == "r R1(a b) = (+ 1 (* 2 3))");
}

TEST_CASE("netlist lines: places in a continued expression are those of the text") {
  const NetlistReading reading("title\nR1 a b {1 +\n* comment\n+ 2 ; why\n+ *}\n");
  CHECK(reading.said() == Said{"t.cir:5:4: error: expected a number, a name or a bracket, found the end"});
  CHECK(NetlistReading("title\n.param a = 1 +\n+ * 2\n").said() ==
        Said{"t.cir:3:3: error: expected a number, a name or a bracket, found \"*\""});
}

TEST_CASE("netlist lines: a + without a card before it is an error") {
  CHECK(NetlistReading("title\n+ R1 a b 1\n").said() ==
        Said{"t.cir:2:1: error: a continuation line stands without a card before it"});
}

TEST_CASE("netlist lines: NUL and Ctrl-Z are told at their place, but for a Ctrl-Z as the last byte") {
  CHECK(NetlistReading(std::string("title\nR1 a b\0 1\nR2 a b 1\n", 25)).said() ==
        Said{"t.cir:2:7: error: a byte that no netlist holds"});
  CHECK(NetlistReading("title\nR1 a b 1\x1a\nR2 a b 1\n").said() ==
        Said{"t.cir:2:9: error: a byte that no netlist holds"});
  CHECK(NetlistReading("title\nR1 a b 1\n\x1a").said().empty());
  CHECK(NetlistReading("title\nR1 a b 1\x1a").element("R1") == "r R1(a b) = 1");
}

TEST_CASE("netlist lines: names hold brackets, signs and bytes beyond ASCII, spelled as they first stand") {
  CHECK(one("R(PULL)3 /VDD Net-(R1-Pad2) 10k") == "r R(PULL)3(/VDD Net-(R1-Pad2)) = 10000");
  CHECK(one("R\xA7Pt1000 Vin 0 1k") == "r R\xA7Pt1000(Vin 0) = 1000");
  CHECK(one("R1 +3V3 unconnected-_U1-Pad3_ 1") == "r R1(+3V3 unconnected-_U1-Pad3_) = 1");
  CHECK(one("R1 a#[0] <b>!%&~@? 1") == "r R1(a#[0] <b>!%&~@?) = 1");
  CHECK(one("R1 ADC adc 1") == "r R1(ADC ADC) = 1");
}

TEST_CASE("netlist lines: commas and brackets part words") {
  CHECK(one("R1 (a,b) 10k") == "r R1(a b) = 10000");
  CHECK(one("E1 (a,b) (c , d) 2") == "e E1(a b c d) = 2");
}

TEST_CASE("netlist lines: the place of an element's name and nodes is that of its words") {
  const NetlistReading reading("title\n  R1 a\n+bc 1\n");
  const model::ElementCard& element = reading.top().elements.front();
  CHECK(reading.netlist().cards[element.card.index()].begin == 8);
  CHECK(reading.netlist().cards[element.card.index()].end == 18);
  CHECK(reading.netlist().words[element.nodes.first + 1].offset == 14);
}
