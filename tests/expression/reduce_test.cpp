#include <cmath>
#include <map>
#include <string>

#include <catch2/catch.hpp>

#include "expression/evaluate.hpp"
#include "tests/expression/trees.hpp"

using expression::Meaning;
using expression::Trouble;
using model::ExpressionId;
using model::Number;
using trees::Function;
using trees::Op;

namespace {

struct Bench {
  base::NameTable names;
  trees::Builder build{names, {}};
  model::ExpressionPool into;
  std::map<std::string, Number> parameters;
  std::map<std::string, std::uint32_t> nets;
  expression::Literals literals = expression::Literals::builder;

  Meaning meaning() {
    Meaning meaning;
    meaning.parameter = [this](base::NameId name) -> std::variant<Number, std::string> {
      const auto at = parameters.find(std::string(names.text(name)));
      if (at == parameters.end()) return "no parameter " + std::string(names.text(name));
      return at->second;
    };
    meaning.net = [this](base::NameId name) -> std::variant<model::NetId, std::string> {
      const auto at = nets.find(std::string(names.text(name)));
      if (at == nets.end()) return "no net " + std::string(names.text(name));
      return model::NetId{at->second};
    };
    meaning.source = [](base::NameId) -> std::variant<model::ElementId, std::string> { return model::ElementId{7}; };
    meaning.literals = literals;
    return meaning;
  }

  // A parameter that is swept: variable `index`.
  void sweep(const std::string& name, std::uint32_t index) {
    model::ExpressionNode node;
    node.op = Op::variable;
    node.index = index;
    into.nodes.push_back(node);
    parameters[name] = Number{0, ExpressionId{static_cast<std::uint32_t>(into.nodes.size() - 1)}};
  }

  expression::Outcome<Number> reduce(ExpressionId tree, std::size_t depth = 200) {
    return expression::reduce(build.pool, tree, meaning(), into, depth);
  }
  Number number(ExpressionId tree) { return std::get<Number>(reduce(tree)); }
  Trouble trouble(ExpressionId tree, std::size_t depth = 200) { return std::get<Trouble>(reduce(tree, depth)); }

  double at(const Number& number, double variable) {
    expression::Leaves leaves;
    leaves.variable = [variable](std::uint32_t) { return variable; };
    return std::get<double>(expression::evaluate(into, number.residual, leaves));
  }
};

}  // namespace

TEST_CASE("a tree of numbers and parameters folds to a number and adds nothing to the pool") {
  Bench b;
  b.parameters["R25"] = {10e3, {}};
  b.parameters["beta"] = {3435, {}};
  // R25*exp(beta*(1/(50+273.15) - 1/298.15)), the beta equation: computed from that formula.
  auto& t = b.build;
  const auto inverse = [&](double kelvin) { return t.op(Op::divide, {t.number(1), t.number(kelvin)}); };
  const auto slope = t.op(Op::subtract, {inverse(323.15), inverse(298.15)});
  const auto tree =
      t.op(Op::multiply,
           {t.parameter("R25"),
            t.call(Function::exp, std::vector<ExpressionId>{t.op(Op::multiply, {t.parameter("beta"), slope})})});
  const Number number = b.number(tree);
  CHECK(number.fixed());
  CHECK(number.value == Approx(10e3 * std::exp(3435 * (1 / 323.15 - 1 / 298.15))).epsilon(1e-14));
  CHECK(b.into.nodes.empty());
}

TEST_CASE("a swept parameter stays free in the residual and everything else is folded") {
  Bench b;
  b.sweep("T", 3);
  b.parameters["R0"] = {1000, {}};
  auto& t = b.build;
  const auto product = t.op(Op::multiply, {t.op(Op::multiply, {t.number(2), t.number(0.5)}), t.parameter("T")});
  const Number number = b.number(t.op(Op::add, {t.parameter("R0"), product}));
  REQUIRE_FALSE(number.fixed());
  CHECK(b.at(number, 385) == 1385);
  CHECK_FALSE(expression::is_behavioural(b.into, number.residual));
  const model::ExpressionNode& root = b.into[number.residual];
  CHECK(root.op == Op::add);
  CHECK(b.into[b.into.argument(root, 0)].op == Op::number);
  CHECK(b.into[b.into.argument(root, 0)].number == 1000);
  const model::ExpressionNode& right = b.into[b.into.argument(root, 1)];
  CHECK(b.into[b.into.argument(right, 0)].number == 1);
  CHECK(b.into[b.into.argument(right, 1)].index == 3);
}

TEST_CASE("net voltages and source currents become leaves that name the flat circuit's nets and elements") {
  Bench b;
  b.nets = {{"a", 4}, {"b", 5}, {"0", 0}};
  auto& t = b.build;
  const Number two = b.number(t.volts("a", "b"));
  CHECK(b.into[two.residual].op == Op::net_volts);
  CHECK(b.into[two.residual].index == 4);
  CHECK(b.into[two.residual].index2 == 5);
  CHECK_FALSE(b.into[two.residual].name.valid());
  const Number one = b.number(t.volts("a"));
  CHECK(b.into[one.residual].index2 == 0);
  const Number current = b.number(t.named(Op::amperes, "V1"));
  CHECK(b.into[current.residual].index == 7);
  CHECK(expression::is_behavioural(b.into, current.residual));
}

TEST_CASE("the voltage of ground, or between a net and itself, is zero") {
  Bench b;
  b.nets = {{"a", 4}, {"0", 0}};
  CHECK(b.number(b.build.volts("0")).value == 0);
  CHECK(b.number(b.build.volts("a", "a")).fixed());
}

TEST_CASE("time is zero and temperature is the circuit's") {
  Bench b;
  CHECK(b.number(b.build.leaf(Op::time, 0)).value == 0);
  CHECK(b.number(b.build.leaf(Op::temperature, 0)).value == 27);
}

TEST_CASE("a branch that is not taken may divide by zero") {
  Bench b;
  auto& t = b.build;
  const auto bad = [&] { return t.op(Op::divide, {t.number(1), t.number(0)}); };
  CHECK(b.number(t.op(Op::choose, {t.number(1), t.number(7), bad()})).value == 7);
  CHECK(b.number(t.op(Op::choose, {t.number(0), bad(), t.number(8)})).value == 8);
  CHECK(b.number(t.op(Op::logical_and, {t.number(0), bad()})).value == 0);
  CHECK(b.number(t.op(Op::logical_or, {t.number(3), bad()})).value == 1);
  CHECK(b.trouble(t.op(Op::choose, {t.number(1), bad(), t.number(7)})).message == "division by zero");
}

TEST_CASE("&& and || give one or zero however much their operands are") {
  Bench b;
  b.sweep("x", 0);
  auto& t = b.build;
  CHECK(b.number(t.op(Op::logical_and, {t.number(2), t.number(5)})).value == 1);
  CHECK(b.number(t.op(Op::logical_or, {t.number(0), t.number(5)})).value == 1);
  const Number free = b.number(t.op(Op::logical_and, {t.number(2), t.parameter("x")}));
  CHECK(b.at(free, 5) == 1);
  CHECK(b.at(free, 0) == 0);
}

TEST_CASE("a condition that is swept keeps both branches") {
  Bench b;
  b.sweep("x", 0);
  auto& t = b.build;
  const auto test = t.op(Op::greater, {t.parameter("x"), t.number(10)});
  const Number number = b.number(t.op(Op::choose, {test, t.number(10e3), t.number(25e3)}));
  CHECK(b.at(number, 11) == 10e3);
  CHECK(b.at(number, 10) == 25e3);
}

TEST_CASE("literals are taken as the builder reads them unless SPICE's reading is asked for") {
  Bench b;
  const auto marking = b.build.odd(4700, 4000);
  const auto bare_m = b.build.odd(1e6, 1e-3);
  CHECK(b.number(marking).value == 4700);
  CHECK(b.number(bare_m).value == 1e6);
  b.literals = expression::Literals::milli;
  CHECK(b.number(marking).value == 4700);
  CHECK(b.number(bare_m).value == 1e-3);
  b.literals = expression::Literals::spice;
  CHECK(b.number(marking).value == 4000);
  const auto nothing = b.build.odd(0.1, std::nan(""));
  CHECK(b.trouble(nothing).message == "this is not a finite number");
}

TEST_CASE("trouble points at the node that has it") {
  Bench b;
  auto& t = b.build;
  const auto one = t.number(1);                           // at 0
  const auto bad = t.op(Op::divide, {one, t.number(0)});  // numbers at 10, division at 20
  const Trouble trouble = b.trouble(t.op(Op::add, {t.number(1), bad}));
  CHECK(trouble.message == "division by zero");
  CHECK(trouble.offset == 20);
}

TEST_CASE("an unknown name is trouble with the sentence of the lookup") {
  Bench b;
  CHECK(b.trouble(b.build.parameter("Rx")).message == "no parameter Rx");
  CHECK(b.trouble(b.build.volts("mid")).message == "no net mid");
  CHECK(b.trouble(b.build.named(Op::user_call, "f")).message == "this function is not known");
}

TEST_CASE("a wrong number of arguments is trouble while folding") {
  Bench b;
  CHECK(b.trouble(b.build.call(Function::sqrt, {1, 2})).message == "sqrt takes 1 argument, not 2");
  CHECK(b.trouble(b.build.op(Op::add, {b.build.number(1)})).message == "an operator takes 2 operands, not 1");
}

TEST_CASE("nesting is trouble beyond the depth that the caller allows and none at it") {
  Bench b;
  ExpressionId tree = b.build.number(1);
  for (int i = 0; i < 9; ++i) tree = b.build.op(Op::negate, {tree});
  CHECK(std::holds_alternative<Number>(b.reduce(tree, 10)));
  CHECK(b.trouble(tree, 9).message == "the expression is nested deeper than the limit expression_depth = 9");
  for (int i = 0; i < 100'000; ++i) tree = b.build.op(Op::negate, {tree});
  CHECK(b.trouble(tree, 1'000'000).message == "the expression is nested deeper than the limit expression_depth = 1000");
}

TEST_CASE("residuals that grow through one another are bounded in depth and in size") {
  Bench b;
  b.sweep("x", 0);
  auto& t = b.build;
  Trouble trouble;
  for (int i = 0; i < 40; ++i) {  // x = x + x: 2^40 terms if unfolded
    const auto outcome = b.reduce(t.op(Op::add, {t.parameter("x"), t.parameter("x")}));
    if (const auto* wrong = std::get_if<Trouble>(&outcome)) {
      trouble = *wrong;
      break;
    }
    b.parameters["x"] = std::get<Number>(outcome);
  }
  CHECK(trouble.message == "the expression unfolds to more than 100000 terms");
}
