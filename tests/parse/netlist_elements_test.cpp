// Elements by letter. Which words are nodes and values: ngspice manual, chapters on circuit elements and sources.
#include <catch2/catch.hpp>

#include "netlist_reading.hpp"

using parse_test::NetlistReading;
using parse_test::one;

TEST_CASE("netlist elements: resistors, capacitors and inductors have two nodes and a value in any of its forms") {
  CHECK(one("R1 a b 10k") == "r R1(a b) = 10000");
  CHECK(one("R1 a b 4.7kohm") == "r R1(a b) = 4700");
  CHECK(one("C1 a b 100n IC=0") == "c C1(a b) = 1e-07 IC=0");
  CHECK(one("L1 a b 10u Rser=0.1") == "l L1(a b) = 1e-05 Rser=0.1");
  CHECK(one("R1 a b {1k*x}") == "r R1(a b) = (* 1000 x)");
  CHECK(one("R1 a b '1k*x'") == "r R1(a b) = (* 1000 x)");
  CHECK(one("R1 a b R=10k") == "r R1(a b) = 10000");
  CHECK(one("R1 a b R=1k*x tc1=1m") == "r R1(a b) = (* 1000 x) tc1=0.001");
  CHECK(one("R1 a b R = 'TIME > 70m ? 10k : 25k'") == "r R1(a b) = (? (> time 0.07) 10000 25000)");
  CHECK(one("R1 a b resistance = {x}") == "r R1(a b) = x");
  CHECK(one("R1 a b") == "r R1(a b)");
}

TEST_CASE("netlist elements: both readings of a value are kept where SPICE and the builder differ") {
  CHECK(one("R1 a b 4k7") == "r R1(a b) = 4700|4000");
  CHECK(one("R1 a b 1M") == "r R1(a b) = 1000000|0.001 M");
  CHECK(one("R1 a b 10k 1%") == "r R1(a b) = 10000|1~0.01");
  CHECK(one("R1 a b 4,7k") == "r R1(a b) = 4700|7000");
  CHECK(one("R1 a b 10k (0805)") == "r R1(a b) = 10000|805");
  CHECK(one("C17 /GND /VDD 1 \xC2\xB5"
            "F (0603)") == "c C17(/GND /VDD) = 1e-06|603");
  CHECK(one("R1 a b R (10 k\xCE\xA9)").substr(0, 17) == "r R1(a b) = 10000");
  CHECK(one("C1 a b 10 uF").substr(0, 17) == "c C1(a b) = 1e-05");
}

TEST_CASE("netlist elements: temperature coefficients and tolerance are parameters") {
  CHECK(one("R1 a b 10k tc1=0.1 tc2=0.2 tol=1%") == "r R1(a b) = 10000 tc1=0.1 tc2=0.2 tol=0.01|1");
  CHECK(one("R1 a b 10k TC=0.1,0.2") == "r R1(a b) = 10000 tc1=0.1 tc2=0.2");
  CHECK(one("R1 a b 10k TC=0.1") == "r R1(a b) = 10000 tc1=0.1");
  CHECK(one("C1 a b 1u V=50 mfg=\"A B, C\" pn=\"860 1\"") == "c C1(a b) = 1e-06 V=50 mfg=word A B, C pn=word 860 1");
}

TEST_CASE("netlist elements: a word that is no number is kept as the reference, a model before the value too") {
  CHECK(one("R2 VCC GND __R2") == "r R2(VCC GND) __R2 = word __R2");
  CHECK(one("R1 a b NTC10k") == "r R1(a b) NTC10k = word NTC10k");
  CHECK(one("R_R1 a b R_R1 10k TC=0,0\n.model R_R1 RES R=1 DEV=5%") == "r R_R1(a b) R_R1 = 10000 tc1=0 tc2=0");
  CHECK(one("R1 a b 10k RMOD\n.model RMOD R") == "r R1(a b) RMOD = 10000");
  CHECK(one("R1 a b <No valid value attribute found>").substr(0, 12) == "r R1(a b) <N");
}

TEST_CASE("netlist elements: a third word that is a node elsewhere makes a part of three pins") {
  const NetlistReading reading("title\nRV1 a w b 10k\nR2 b 0 1k\n");
  CHECK(reading.element("RV1") == "? RV1(a w b) 10k");
  CHECK(reading.fates() == "1 1 0 0");
}

TEST_CASE("netlist elements: a source holds its DC value, or else what its function of time begins with") {
  CHECK(one("V1 a 0 5") == "v V1(a 0) = 5");
  CHECK(one("V1 a 0 DC 5 AC 1 0") == "v V1(a 0) = 5");
  CHECK(one("V1 a 0 DC=5") == "v V1(a 0) = 5");
  CHECK(one("V1 a GND ( 9 )") == "v V1(a GND) = 9");
  CHECK(one("V1 a 0 {vcc/2}") == "v V1(a 0) = (/ vcc 2)");
  CHECK(one("V1 a 0 3.3 Rser=50m") == "v V1(a 0) = 3.3 Rser=0.05");
  CHECK(one("V1 a 0 18Vdc") == "v V1(a 0) = 18");
  CHECK(one("V1 a 0") == "v V1(a 0)");
  CHECK(one("V1 a 0 SIN(2.5)") == "v V1(a 0) = 2.5");
  CHECK(one("V1 a 0 AC 1") == "v V1(a 0) = 0");
  CHECK(one("R1 a b {x} 1%") == "r R1(a b) = x tol=0.01|1");
  CHECK(one("I1 a 0 AC 1") == "i I1(a 0) = 0");
  CHECK(one("I1 a 0 1m") == "i I1(a 0) = 0.001");
  CHECK(one("V1 a 0 PULSE(1 2 0 1n)") == "v V1(a 0) = 1");
  CHECK(one("V1 a 0 SIN (2.5 1 1k)") == "v V1(a 0) = 2.5");
  CHECK(one("V1 a 0 EXP(3 4)") == "v V1(a 0) = 3");
  CHECK(one("V1 a 0 PWL(0 6 1 7)") == "v V1(a 0) = 6");
  CHECK(one("V1 a 0 SFFM(8 1)") == "v V1(a 0) = 8");
  CHECK(one("V1 a 0 DC 4 PULSE(1 2)") == "v V1(a 0) = 4");
  CHECK(one("V1 a 0 PWL file=x.txt") == "v V1(a 0) = word file");
  CHECK(one("IC1 PB5 PB3 PB4 GND PART-1") == "? IC1(PB5 PB3 PB4 GND) PART-1");
}

TEST_CASE("netlist elements: diodes and transistors end their nodes before the last known model") {
  CHECK(one("D1 a k DX 2 off") == "d D1(a k) DX off area=2");
  CHECK(one("Q1 c b e BC") == "q Q1(c b e) BC");
  CHECK(one("Q1 c b e s BC\n.model BC NPN") == "q Q1(c b e s) BC");
  CHECK(one("Q1 c b e s t BC 2\n.model BC NPN") == "q Q1(c b e s t) BC area=2");
  CHECK(one("Q1 c b e BC 2\n.model OTHER NPN") == "q Q1(c b e) BC area=2");
  CHECK(one("J1 d g s JX") == "j J1(d g s) JX");
  CHECK(one("M1 d g s b MX W=1u L=2u") == "m M1(d g s b) MX W=1e-06 L=2e-06");
  CHECK(one("M1 d g s MX\n.model MX VDMOS") == "m M1(d g s) MX");
  CHECK(one("M1 d g s b MX\n.model MX NMOS") == "m M1(d g s b) MX");
}

TEST_CASE("netlist elements: a model defined behind its part, inside a subcircuit or with another case, is known") {
  const NetlistReading reading("title\n.subckt S a b c\nQ1 a b c 0 BC\n.ends\n.model bc NPN\n");
  CHECK(reading.element("Q1") == "q Q1(a b c 0) BC");
}

TEST_CASE("netlist elements: words that do not fit the letter make a part without a model") {
  CHECK(one("J1 a ? ? GND ? CONN") == "? J1(a ? ? GND ?) CONN");
  CHECK(one("J2 a GND CONN") == "? J2(a GND) CONN");
  CHECK(one("SW1 a b PUSH") == "? SW1(a b) PUSH");
  CHECK(one("FB1 a b BEAD") == "? FB1(a b) BEAD");
  CHECK(one("BT1 + - CELL") == "? BT1(+ -) CELL");
  CHECK(one("K1 a b c RELAY") == "? K1(a b c) RELAY");
  CHECK(one("U1 __U1") == "? U1() __U1");
  CHECK(one("R7 __R7") == "? R7() __R7");
}

TEST_CASE("netlist elements: controlled sources are linear, an expression, a table or a polynomial") {
  CHECK(one("E1 a b c d 10") == "e E1(a b c d) = 10");
  CHECK(one("G1 a b c d {gm}") == "g G1(a b c d) =A gm");
  CHECK(one("E1 a b VALUE={V(c,d)*2}") == "e E1(a b) = (* V(c,d) 2)");
  CHECK(one("E1 a b VALUE {V(c)}") == "e E1(a b) = V(c)");
  CHECK(one("E1 a b vol='2*V(c)'") == "e E1(a b) = (* 2 V(c))");
  CHECK(one("G1 a b cur=V(c)/1k") == "g G1(a b) =A (/ V(c) 1000)");
  CHECK(one("E1 a b TABLE {V(c)} = (0,0) (1,{x})") == "e E1(a b) = (table V(c) 0 0 1 x)");
  CHECK(one("G1 a b c d table=(0,0) (1,2)") == "g G1(a b) =A (table V(c,d) 0 0 1 2)");
  CHECK(one("E1 a b POLY(2) c d e f 0 1 1") == "e E1(a b) POLY");
  CHECK(one("E1 a b c d laplace=1/(1+s)") == "e E1(a b c d) LAPLACE");
  CHECK(one("F1 a b V1 2") == "f F1(a b) V1 =A 2");
  CHECK(one("H1 a b V1 {2*x}") == "h H1(a b) V1 = (* 2 x)");
  CHECK(one("F1 a b POLY(1) V1 0 1") == "f F1(a b) POLY");
}

TEST_CASE("netlist elements: a behavioural source takes its expression up to the next key") {
  CHECK(one("B1 a b V=V(c)*2 + I(V1) tc1=3") == "b B1(a b) = (+ (* V(c) 2) I(V1)) tc1=3");
  CHECK(one("B1 a b I = V(c)==3 ? 1 : 2") == "b B1(a b) =A (? (== V(c) 3) 1 2)");
  CHECK(one("B1 a b tc1=1 V={x}") == "b B1(a b) = x");
  CHECK(one("B1 a b V=(1+2)*x") == "b B1(a b) = (* (+ 1 2) x)");
}

TEST_CASE("netlist elements: switches have their model and may start open") {
  CHECK(one("S1 a b c d SX") == "s S1(a b c d) SX");
  CHECK(one("S1 a b c d SX OFF") == "s S1(a b c d) SX off");
  CHECK(one("W1 a b V1 WX ON") == "w W1(a b) V1 WX");
}

TEST_CASE("netlist elements: a coupling is read and makes no element") {
  const NetlistReading reading("title\nK1 L1 L2 0.99\n");
  CHECK(reading.top().elements.empty());
  CHECK(reading.fates() == "1 0 0 0");
}

TEST_CASE("netlist elements: the last word before PARAMS: or the first key names the subcircuit of an instance") {
  CHECK(one("X1 a b NTC PARAMS: T={T1} R25=10k BETA=Bn*2") == "x X1(a b) NTC T=T1 R25=10000 BETA=(* Bn 2)");
  CHECK(one("X1 a b NTC T = x") == "x X1(a b) NTC T=word x");
  CHECK(one("X1 a b NTC PARAMS:") == "x X1(a b) NTC");
  CHECK(one("X1 a b S861(C1)_5000") == "x X1(a b) S861(C1)_5000");
  CHECK(one("XU1 __U1") == "x XU1() __U1");
}

TEST_CASE("netlist elements: unknown letters are parts, the last word says what they are") {
  CHECK(one("U1 a b c PART") == "u U1(a b c) PART");
  CHECK(one("ARV1 a w b __RV1") == "a ARV1(a w b) __RV1");
  CHECK(one("T1 a b c d Z0=50") == "t T1(a b c) d Z0=50");
  CHECK(one("Y1 a b 8MHz") == "y Y1(a b) 8MHz");
  CHECK(one("P8 VCC +") == "p P8(VCC) +");
  CHECK(one("\xC3\x84"
            "1 a b") ==
        "? \xC3\x84"
        "1(a) b");
}

TEST_CASE("netlist elements: a source that has but a function of time or a signal is marked as taken at time zero") {
  const NetlistReading reading(
      "title\nV1 a 0 PULSE(0 3.3 0 1n)\nV2 b 0 DC 5 PULSE(0 3.3 0 1n)\nV3 c 0\nV4 d 0 AC 1\nV5 e 0 5\nV6 f 0 SIN(2 1 "
      "1k) AC 1\n");
  std::string marks;
  for (const model::ElementCard& element : reading.top().elements) marks += element.at_time_zero ? '1' : '0';
  CHECK(marks == "100101");
  CHECK(reading.element("V6") == "v V6(f 0) = 2");
}

TEST_CASE("netlist elements: an odd literal's place holds its last bracket") {
  const NetlistReading reading("title\nR1 a b 10k (0805)\n");
  REQUIRE(reading.netlist().odd_literals.size() == 1);
  CHECK(reading.netlist().odd_literals[0].where.length == 10);
}
