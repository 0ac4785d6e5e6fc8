// Broken declarations, each with its exact message, line and column.
#include <catch2/catch.hpp>

#include "parse/sheet_reading.hpp"

using sheet_test::Messages;
using sheet_test::read;
using sheet_test::read_netlist;

namespace {

struct Row {
  const char* toml;
  Messages messages;
};

void check(const std::vector<Row>& rows) {
  for (const Row& row : rows) {
    INFO(row.toml);
    CHECK(read(row.toml).messages() == row.messages);
  }
}

// A converter and a thermistor that lack nothing but what is put behind them.
std::string converter(const std::string& line) {
  return "[converter.U1]\nbits = 12\nhigh = 3.3\ninputs = [\"A\"]\n" + line;
}
std::string thermistor(const std::string& line) {
  return "[sensor.RT1]\nkind = \"ntc\"\nr25 = 1000\nbeta = 3000\n" + line;
}

}  // namespace

TEST_CASE("a text that is no TOML is one clear sentence at its place") {
  check(
      {{"a b", {"1:3: this is not TOML: expected '=', found 'b', in the key-value pair"}},
       {"[rail.A", {"1:8: this is not TOML: expected ']', found the end of the line, in the table header"}},
       {"[rail.A\nvolts = 1", {"1:8: this is not TOML: expected ']', found the end of the line, in the table header"}},
       {"k = 10k", {"1:7: this is not TOML: expected digit, found 'k', in the decimal integer"}},
       {"a = \"x\nb = 1", {"1:7: this is not TOML: expected the closing quote on the same line, in the string"}},
       {"a = [1 2]", {"1:8: this is not TOML: expected comma or closing ']', found '2', in the array"}},
       {"a = 1\na = 2", {"2:5: this is not TOML: cannot redefine existing integer 'a', in the key-value pair"}},
       {"[rail.A]\n[rail.A]", {"2:1: this is not TOML: cannot redefine existing table 'rail.A', in the table header"}},
       {"a = 1 b = 2", {"1:7: this is not TOML: expected a comment or whitespace, found 'b', in the key-value pair"}},
       {"a = {b = 1,}",
        {"1:12: this is not TOML: expected key-value pair, found closing '}' (dangling comma), in the inline table"}},
       {"# 10 \xB5"
        "F",
        {"1:6: this is not TOML: expected UTF-8, found the byte 0xb5"}},
       {"\xFF", {"1:1: this is not TOML: expected UTF-8, found the byte 0xff"}},
       {"a = 1\n\n\xFF", {"3:1: this is not TOML: expected UTF-8, found the byte 0xff"}},
       {"a = [[[[[[[[[[[[[[[[[[1", {"1:21: this is not TOML: exceeded maximum nested value depth of 16, in the value"}},
       {"[rail.A]\nvolts = 1\n# \"nothing. but. sentences. .......................... 1.5 2.5\"\nohms = [0.1, 0.2] # "
        "3.",
        {"4:8: expected a resistance such as \"10k\", found the array [0.1, 0.2]"}}});
}

TEST_CASE("an unknown key or table is an error with the nearest name") {
  check({{"[sensr.RT1]\nkind = \"ntc\"", {"1:2: unknown table \"sensr\"; did you mean \"sensor\"?"}},
         {"[nonsense]", {"1:2: unknown table \"nonsense\""}},
         {"volts = 3", {"1:1: unknown key \"volts\""}},
         {"[rail.A]\nvolts = 1\nvolt = 2", {"3:1: unknown key \"volt\" in [rail.A]; did you mean \"volts\"?"}},
         {"[rail.A]\nvolts = 1\nxyzzy = 2", {"3:1: unknown key \"xyzzy\" in [rail.A]"}},
         {"[input.A]\nleakge = 1", {"2:1: unknown key \"leakge\" in [input.A]; did you mean \"leakage\"?"}},
         {"[reading]\nM = \"mega\"", {"2:1: unknown key \"M\" in [reading]; did you mean \"m\"?"}},
         {"[limit]\nspan-use = 0.5", {"2:1: unknown rule \"span-use\" in [limit]; did you mean \"span_use\"?"}},
         {"[level]\nload_eror = \"off\"", {"2:1: unknown rule \"load_eror\" in [level]; did you mean \"load_error\"?"}},
         {"[rail.A]\nvolts = 1\n\"a\\u001b\" = 2", {"3:1: unknown key \"a\\x1b\" in [rail.A]"}}});
  CHECK(read(thermistor("from = 0\nto = 9\nbetta = 3")).messages() ==
        Messages{"7:1: unknown key \"betta\" in [sensor.RT1]; did you mean \"beta\"?"});
}

TEST_CASE("a value of the wrong type says what was expected and what stands there") {
  check(
      {{"rail = 5", {"1:1: expected a table [rail.NAME], found the number 5"}},
       {"[rail]\nvolts = 3.3", {"2:1: expected a table [rail.NAME], found the number 3.3"}},
       {"[[rail]]\nvolts = 3.3", {"1:3: expected a table [rail.NAME], found the array [[rail]]"}},
       {"limit = true", {"1:9: expected a table [limit], found the truth value true"}},
       {"[input.A]\nlimit = 3", {"2:9: expected a table [input.A.limit], found the number 3"}},
       {"[rail.A]\nvolts = [1, 2]", {"2:9: expected a voltage such as \"3.3 V\", found the array [1, 2]"}},
       {"[rail.A]\nvolts = {a = 1}", {"2:9: expected a voltage such as \"3.3 V\", found a table"}},
       {"[rail.A]\nvolts = inf", {"2:9: expected a voltage such as \"3.3 V\", found the number inf"}},
       {"[rail.A]\nvolts = 2027-01-01",
        {"2:9: expected a voltage such as \"3.3 V\", found the date or time 2027-01-01"}},
       {"[rail.A]\nvolts = \"3.3 kOhm\"",
        {"2:9: expected a voltage such as \"3.3 V\", found \"3.3 kOhm\", which is in ohms"}},
       {"[rail.A]\nvolts = 1\nohms = [\n1, 2]", {"3:8: expected a resistance such as \"10k\", found the array [ ..."}},
       {"[part.R1]\nrole = \"sense\"", {"2:8: expected \"arm\" or \"load\", found the text \"sense\""}},
       {"[level]\nspan_use = \"fatal\"",
        {"2:12: expected \"error\", \"warning\", \"note\" or \"off\", found the text \"fatal\""}},
       {"[reading]\nm = 1", {"2:5: expected \"milli\" or \"mega\", found the number 1"}}});
}

TEST_CASE("a value out of its range is refused") {
  check({{"[rail.A]\nvolts = 1\nohms = -1", {"3:8: this must not be negative, found the number -1"}},
         {"[input.A]\ngain = 0", {"2:8: this must be above zero, found the number 0"}},
         {"[input.A]\nleakage = \"-1nA\"", {"2:11: this must not be negative, found the text \"-1nA\""}},
         {"[input.A]\nbits = 0", {"2:8: expected a whole number from 1 to 32, found the number 0"}},
         {"[input.A]\nbits = 33", {"2:8: expected a whole number from 1 to 32, found the number 33"}},
         {"[input.A]\nbits = 12.0", {"2:8: expected a whole number from 1 to 32, found the number 12.0"}},
         {"[input.A]\naverage = 0", {"2:11: expected a whole number of at least 1, found the number 0"}},
         {"[input.A]\nlow = 3\nhigh = 3", {"3:8: \"high\" must be above \"low\", found 3 V and 3 V"}},
         {"[input.A]\nlow = \"vref\"\nhigh = \"VREF\"", {"3:8: \"low\" and \"high\" are the same net"}},
         {"[input.A]\nhigh = \"\"", {"2:8: expected a voltage or the name of a net, found the text \"\""}},
         {"[input.A]\noffset_error = 2", {"2:16: expected an error such as \"2 LSB\" or \"5 mV\", found the number 2"}},
         {"[input.A]\noffset_error = \"2 %\"",
          {"2:16: expected an error such as \"2 LSB\" or \"5 mV\", found the text \"2 %\""}},
         {"[input.A]\noffset_error = \"-2 LSB\"", {"2:16: this must not be negative, found the text \"-2 LSB\""}},
         {"[limit]\nspan_use = 50", {"2:12: expected a fraction from 0 to 1, found the number 50"}},
         {"[limit]\nload_error = -1", {"2:14: this must not be negative, found the number -1"}},
         {"[limit]\nno_divider = 1", {"2:1: \"no_divider\" compares nothing, so it has no limit"}}});
  CHECK(read(converter("expect_inputs = -1")).messages() ==
        Messages{"5:17: expected a whole number of at least 1, found the number -1"});
  CHECK(read(converter("low = 5")).messages() == Messages{"3:8: \"high\" must be above \"low\", found 3.3 V and 5 V"});
}

TEST_CASE("a table that lacks a key says which") {
  check({{"[rail.A]\nohms = 1", {"1:7: [rail.A] needs \"volts\", or a sensor of kind \"voltage\" with its name"}},
         {"[converter.U1]",
          {"1:12: [converter.U1] needs \"bits\"", "1:12: [converter.U1] needs \"high\"",
           "1:12: [converter.U1] needs \"inputs\""}},
         {"[sensor.A]\nfrom = 1",
          {"1:9: [sensor.A] needs \"kind\": one of \"ntc\", \"rtd\", \"photoresistor\", \"voltage\", \"parameter\""}},
         {"[sensor.V]\nkind = \"voltage\"", {"1:9: [sensor.V] needs \"from\"", "1:9: [sensor.V] needs \"to\""}},
         {"[sensor.X]\nkind = \"parameter\"\nfrom = 0\nto = 1",
          {"1:9: [sensor.X] needs \"sweep\": the parameter that it sweeps"}},
         {"[part.U1]", {"1:7: [part.U1] needs \"model\" or \"role\""}},
         {"[part.U1]\nmodel = \"resistor\"", {"1:7: [part.U1] needs \"ohms\": the resistance of its stand-in"}},
         {"[rail.\"\"]\nvolts = 1", {"1:7: [rail.NAME] needs a name that is not empty"}}});
}

TEST_CASE("inputs are net names, each once") {
  const auto with_inputs = [](const std::string& inputs) {
    return read("[converter.U1]\nbits = 12\nhigh = 3.3\ninputs = " + inputs).messages();
  };
  CHECK(with_inputs("\"A\"") ==
        Messages{"4:10: expected an array of nets such as [\"ADC_1\", \"ADC_2\"], found the text \"A\""});
  CHECK(with_inputs("[]") ==
        Messages{"4:10: expected an array of nets such as [\"ADC_1\", \"ADC_2\"], found the array []"});
  CHECK(with_inputs("[1, \"A\", \"a\"]") ==
        Messages{"4:11: expected the name of a net, found the number 1", "4:19: \"a\" is listed twice"});
  CHECK(read("[input.A]\ninputs = [\"A\"]").messages() ==
        Messages{"2:1: \"inputs\" belongs in a table [converter.NAME], not in [input.A]"});
}

TEST_CASE("a sensor that cannot be is refused at the key that is wrong") {
  const auto thermistor_with = [](const std::string& line) { return read(thermistor(line)).messages(); };
  CHECK(read("[sensor.A]\nkind = \"ntx\"").messages() ==
        Messages{"2:8: unknown kind \"ntx\"; expected one of \"ntc\", \"rtd\", \"photoresistor\", \"voltage\", "
                 "\"parameter\""});
  CHECK(read("[sensor.A]\nkind = 5").messages() ==
        Messages{"2:8: expected a kind of sensor (\"ntc\", \"rtd\", \"photoresistor\", \"voltage\", \"parameter\"), "
                 "found the number 5"});
  CHECK(thermistor_with("from = 50\nto = 0") == Messages{"6:6: \"to\" must be above \"from\", found 0 and 50"});
  CHECK(thermistor_with("from = 50\nto = 50") == Messages{"6:6: \"to\" must be above \"from\", found 50 and 50"});
  CHECK(thermistor_with("from = \"1 V\"\nto = 50") ==
        Messages{"5:8: expected a temperature such as \"25 degC\", found \"1 V\", which is in volts"});
  CHECK(thermistor_with("from = 0\nto = 50\naccuracy = 0") ==
        Messages{"7:12: this must be above zero, found the number 0"});
  CHECK(thermistor_with("from = 0\nto = 50\nspacing = \"cubic\"") ==
        Messages{"7:11: expected \"linear\" or \"log\", found the text \"cubic\""});
  CHECK(thermistor_with("from = 0\nto = 50\nsweep = \"T\"") ==
        Messages{"7:1: \"sweep\" goes with kind \"parameter\" only, not with \"ntc\""});
  CHECK(thermistor_with("from = 0\nto = 50\nr0 = 100") ==
        Messages{"7:1: \"r0\" is a key of kind \"rtd\", not of \"ntc\""});
  CHECK(thermistor_with("from = 0\nto = 50\nbetween = [\"A\"]") ==
        Messages{"7:11: expected two nets such as [\"NET_A\", \"0\"], found the array [\"A\"]"});
  CHECK(thermistor_with("from = 0\nto = 50\nbetween = [\"A\", \"a\"]") ==
        Messages{"7:11: expected two different nets, found the array [\"A\", \"a\"]"});
  CHECK(read("[sensor.V]\nkind = \"voltage\"\nfrom = 0\nto = 5\nbetween = [\"A\", \"B\"]").messages() ==
        Messages{"5:1: \"between\" does not go with kind \"voltage\": the table's name is the rail's"});
  CHECK(
      read("[sensor.X1]\nkind = \"parameter\"\nsweep = \"T\"\nfrom = 0\nto = 5\nbetween = [\"A\", \"B\"]").messages() ==
      Messages{
          "6:1: \"between\" does not go with kind \"parameter\": the part that the table names has its ends in the "
          "netlist"});
}

TEST_CASE("parts refuse a resistance that goes with no stand-in") {
  CHECK(read("[part.U1]\nmodel = \"open\"\nohms = 5").messages() ==
        Messages{"3:1: \"ohms\" goes with model \"resistor\" only"});
  CHECK(read("[part.U1]\nmodel = \"closed\"").messages() ==
        Messages{"2:9: expected \"open\" or \"resistor\", found the text \"closed\""});
}

TEST_CASE("errors in *| lines stand at the netlist's own line and column") {
  CHECK(
      read_netlist("board\nR1 a 0 1k\n*| [rail.VDD]\nC1 a 0 1u\n*| volts = \"3.3 W\"\n*| ohm = 1\n.end\n").messages() ==
      Messages{"5:12: expected a voltage such as \"3.3 V\", found \"3.3 W\", which is in watts",
               "6:4: unknown key \"ohm\" in [rail.VDD]; did you mean \"ohms\"?"});
  CHECK(read_netlist("board\nR1 a 0 1k\n*| [rail.VDD\n.end\n").messages() ==
        Messages{"3:13: this is not TOML: expected ']', found the end of the line, in the table header"});
  CHECK(read_netlist("board\n*| # 4k7 \xB1"
                     "1%\n")
            .messages() == Messages{"2:10: this is not TOML: expected UTF-8, found the byte 0xb1"});
  CHECK(read_netlist("\xFF\n*| x\n").messages() ==
        Messages{"2:5: this is not TOML: expected '=', found the end of the line, in the key-value pair"});
}

TEST_CASE("one run tells all errors of a place") {
  CHECK(
      read("[rail.A]\nvolts = \"x\"\nohms = -1\nfoo = 1\n[converter.U1]\nbits = 99\nhigh = []\n[sensor.S]\nkind = "
           "\"no\"\n")
          .messages() ==
      Messages{
          "2:9: expected a voltage such as \"3.3 V\", found \"x\"",
          "3:8: this must not be negative, found the number -1", "4:1: unknown key \"foo\" in [rail.A]",
          "6:8: expected a whole number from 1 to 32, found the number 99",
          "7:8: expected a voltage or the name of a net, found the array []", "5:12: [converter.U1] needs \"inputs\"",
          "9:8: unknown kind \"no\"; expected one of \"ntc\", \"rtd\", \"photoresistor\", \"voltage\", \"parameter\""});
}
