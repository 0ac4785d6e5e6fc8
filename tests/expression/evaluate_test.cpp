#include "expression/evaluate.hpp"

#include <limits>

#include <catch2/catch.hpp>

#include "tests/expression/trees.hpp"

using expression::Leaves;
using expression::Trouble;
using trees::Op;

TEST_CASE("leaves of a flat tree take the values they are given") {
  base::NameTable names;
  trees::Builder t{names, {}};
  Leaves leaves;
  leaves.variable = [](std::uint32_t index) { return index == 2 ? 5.0 : 0.0; };
  leaves.net_volts = [](model::NetId plus, model::NetId minus) {
    return plus.value == 3 && minus.value == 1 ? 2.0 : 0.0;
  };
  leaves.amperes = [](model::ElementId source) { return source.value == 9 ? 0.5 : 0.0; };
  const auto sum = t.op(
      Op::add, {t.leaf(Op::variable, 2), t.op(Op::multiply, {t.leaf(Op::net_volts, 3, 1), t.leaf(Op::amperes, 9)})});
  CHECK(std::get<double>(expression::evaluate(t.pool, sum, leaves)) == 6);
  CHECK(expression::is_behavioural(t.pool, sum));
  CHECK_FALSE(expression::is_behavioural(t.pool, t.leaf(Op::variable, 2)));
}

TEST_CASE("a leaf that nobody gives a value is trouble, each kind with its own sentence") {
  base::NameTable names;
  trees::Builder t{names, {}};
  const auto message = [&](model::ExpressionId tree) {
    return std::get<Trouble>(expression::evaluate(t.pool, tree, {})).message;
  };
  CHECK(message(t.leaf(Op::variable, 0)) == "a swept value is not known here");
  CHECK(message(t.leaf(Op::net_volts, 1)) == "a net's voltage is not known here");
  CHECK(message(t.leaf(Op::amperes, 1)) == "a source's current is not known here");
  CHECK(message(t.parameter("p")) == "a name has no value here");
}

TEST_CASE("a leaf without a finite value is trouble at its place") {
  base::NameTable names;
  trees::Builder t{names, {}};
  Leaves leaves;
  leaves.variable = [](std::uint32_t) { return std::numeric_limits<double>::infinity(); };
  const auto tree = t.op(Op::add, {t.number(1), t.leaf(Op::variable, 0)});
  const auto outcome = expression::evaluate(t.pool, tree, leaves);
  CHECK(std::get<Trouble>(outcome).message == "a value is not finite");
  CHECK(std::get<Trouble>(outcome).offset == 10);
}

TEST_CASE("evaluating takes only the branch that counts") {
  base::NameTable names;
  trees::Builder t{names, {}};
  const auto bad = t.op(Op::divide, {t.number(1), t.number(0)});
  const auto value = [&](model::ExpressionId tree) { return std::get<double>(expression::evaluate(t.pool, tree, {})); };
  CHECK(value(t.op(Op::choose, {t.number(0), bad, t.number(2)})) == 2);
  CHECK(value(t.op(Op::logical_and, {t.number(0), bad})) == 0);
  CHECK(value(t.op(Op::logical_or, {t.number(1), bad})) == 1);
}

TEST_CASE("a tree nested beyond all bounds is trouble and no crash") {
  base::NameTable names;
  trees::Builder t{names, {}};
  auto tree = t.number(1);
  for (int i = 0; i < 100'000; ++i) tree = t.op(Op::negate, {tree});
  CHECK(std::get<Trouble>(expression::evaluate(t.pool, tree, {})).message == "the expression is nested too deeply");
}

TEST_CASE("operators added to a pool hold how deep they are and how much they unfold to") {
  model::ExpressionPool pool;
  const auto ten = expression::add_number(pool, 10);
  const auto half = expression::add_binary(pool, Op::divide, model::Number{1, {}}, model::Number{0, ten});
  const auto root = expression::add_binary(pool, Op::multiply, model::Number{0, half}, model::Number{5, {}});
  CHECK(std::get<double>(expression::evaluate(pool, root, {})) == 0.5);
  CHECK(pool[half].index == 2);
  CHECK(pool[root].index == 3);
  CHECK(pool[root].index2 == 5);
}
