#include "simulate/expression_text.hpp"

#include <cmath>
#include <string_view>
#include <unordered_map>
#include <utility>

#include "expression/evaluate.hpp"
#include "simulate/numbers.hpp"

namespace simulate {
namespace {

using model::ExpressionId;
using model::ExpressionNode;
using model::Function;
using model::Op;

// The library's time for an expression grows with the square of its length: 11 ms at this length.
constexpr std::size_t most_bytes = 16000;
constexpr int most_depth = 400;

// How the library writes an operation: text with the operands in the places of %0, %1, %2.
template <class Key>
struct Form {
  Key key;
  std::string_view pattern;
};

// Comparisons are functions in the library; their values are 1 and 0.
constexpr Form<Op> operator_forms[] = {
    {Op::negate, "(-(%0))"},
    {Op::logical_not, "eq0(%0)"},
    {Op::add, "(%0+%1)"},
    {Op::subtract, "(%0-%1)"},
    {Op::multiply, "(%0*%1)"},
    {Op::divide, "(%0/%1)"},
    {Op::remainder, "(%0-%1*sgn(%0/%1)*floor(abs(%0/%1)))"},
    {Op::less, "lt0(%0-%1)"},
    {Op::less_equal, "le0(%0-%1)"},
    {Op::greater, "gt0(%0-%1)"},
    {Op::greater_equal, "ge0(%0-%1)"},
    {Op::equal, "eq0(%0-%1)"},
    {Op::not_equal, "ne0(%0-%1)"},
    {Op::logical_and, "(ne0(%0)*ne0(%1))"},
    {Op::logical_or, "gt0(ne0(%0)+ne0(%1))"},
    {Op::choose, "ternary_fcn(ne0(%0),%1,%2)"},
};

constexpr Form<Function> call_forms[] = {
    {Function::abs, "abs(%0)"},
    {Function::sgn, "sgn(%0)"},
    {Function::sqrt, "sqrt(%0)"},
    {Function::exp, "exp(%0)"},
    {Function::ln, "ln(%0)"},
    {Function::log10, "log10(%0)"},
    {Function::sin, "sin(%0)"},
    {Function::cos, "cos(%0)"},
    {Function::tan, "tan(%0)"},
    {Function::asin, "asin(%0)"},
    {Function::acos, "acos(%0)"},
    {Function::atan, "atan(%0)"},
    {Function::atan2,
     "ternary_fcn(gt0(%1),atan(%0/%1),ternary_fcn(ge0(%0),1.5707963+2.679489662e-08-atan(%1/%0),"
     "-1.5707963-2.679489662e-08-atan(%1/%0)))"},
    {Function::sinh, "sinh(%0)"},
    {Function::cosh, "cosh(%0)"},
    {Function::tanh, "tanh(%0)"},
    {Function::asinh, "asinh(%0)"},
    {Function::acosh, "acosh(%0)"},
    {Function::atanh, "atanh(%0)"},
    {Function::floor, "floor(%0)"},
    {Function::ceil, "ceil(%0)"},
    {Function::round, "nint(%0)"},
    {Function::integer, "(sgn(%0)*floor(abs(%0)))"},
    {Function::power_of_magnitude, "pow(abs(%0),%1)"},
    {Function::signed_power, "pwr(%0,%1)"},
    {Function::limit, "max(min(%0,max(%1,%2)),min(%1,%2))"},
    {Function::step, "u(%0)"},
    {Function::ramp, "uramp(%0)"},
    {Function::nominal, "(%0)"},
};

// Empty where the library has no such thing.
template <class Key, std::size_t N>
std::string_view pattern_of(Key key, const Form<Key> (&forms)[N]) {
  for (const Form<Key>& form : forms) {
    if (form.key == key) return form.pattern;
  }
  return {};
}

class Writer {
 public:
  Writer(std::string& out, const model::ExpressionPool& pool, double variable, const LeafNames& leaves)
      : out_(out), pool_(pool), variable_(variable), leaves_(leaves), begin_(out.size()) {}

  void write(ExpressionId tree) {
    if (!trouble_.empty()) return;
    if (++depth_ > most_depth || out_.size() - begin_ > most_bytes) {
      trouble_ = "the expression of a source is too long for the simulator";
    } else if (asks(tree)) {
      write_node(pool_[tree]);
    } else {
      write_constant(tree);
    }
    --depth_;
  }

  [[nodiscard]] const std::string& trouble() const { return trouble_; }

  // Whether a tree asks for a voltage or a current.
  bool asks(ExpressionId tree) {
    const auto known = asks_.find(tree.value);
    if (known != asks_.end()) return known->second;
    const ExpressionNode& node = pool_[tree];
    bool found = node.op == Op::net_volts || node.op == Op::amperes;
    asks_[tree.value] = found;
    for (std::size_t i = 0; i < node.argument_count && !found; ++i) found = asks(pool_.argument(node, i));
    asks_[tree.value] = found;
    return found;
  }

  std::optional<double> constant(ExpressionId tree) {
    const auto value = constant_value(pool_, tree, variable_);
    if (!value) {
      if (trouble_.empty()) trouble_ = value.error();
      return {};
    }
    return *value;
  }

 private:
  void write_constant(ExpressionId tree) {
    if (const auto value = constant(tree)) literal(*value);
  }

  void literal(double value) {
    if (std::isfinite(value)) {
      append_literal(out_, value);
    } else {
      trouble_ = "the expression of a source has no finite value";
    }
  }

  void text(std::string_view piece) { out_.append(piece); }

  // Pieces of text with operands between them: "%0" is the node's first argument.
  void form(const ExpressionNode& node, std::string_view pattern) {
    for (std::size_t i = 0; i < pattern.size() && trouble_.empty(); ++i) {
      if (pattern[i] == '%') {
        write(pool_.argument(node, static_cast<std::size_t>(pattern[++i] - '0')));
      } else {
        out_.push_back(pattern[i]);
      }
    }
  }

  void write_node(const ExpressionNode& node) {
    switch (node.op) {
      case Op::net_volts:
        if (!leaves_.net_volts(out_, model::NetId{node.index}, model::NetId{node.index2})) {
          trouble_ = "the expression of a source depends on a net outside its network";
        }
        return;
      case Op::amperes:
        if (!leaves_.amperes(out_, model::ElementId{node.index})) {
          trouble_ = "the expression of a source depends on a current outside its network";
        }
        return;
      case Op::power:
        return write_power(node);
      case Op::call:
        return write_call(node);
      default:
        return write_operator(node);
    }
  }

  void write_operator(const ExpressionNode& node) {
    const std::string_view pattern = pattern_of(node.op, operator_forms);
    if (pattern.empty()) {
      trouble_ = "the expression of a source holds an operation that the simulator does not know";
      return;
    }
    form(node, pattern);
  }

  // The library's pow(x, y) takes x without its sign, its pwr(x, y) gives the sign back: together they make whole
  // exponents right.
  void write_power(const ExpressionNode& node) {
    if (asks(pool_.argument(node, 1))) return form(node, "pow(%0,%1)");
    const auto exponent = constant(pool_.argument(node, 1));
    if (!exponent) return;
    const bool odd = std::fmod(std::fabs(*exponent), 2) == 1;
    form(node, odd ? "pwr(%0,%1)" : "pow(%0,%1)");
  }

  void write_call(const ExpressionNode& node) {
    switch (node.function) {
      case Function::pow:
        return write_power(node);
      case Function::min:
        return write_fold(node, "min(");
      case Function::max:
        return write_fold(node, "max(");
      case Function::table:
        return write_table(node);
      default:
        break;
    }
    const std::string_view pattern = pattern_of(node.function, call_forms);
    if (!pattern.empty()) return form(node, pattern);
    trouble_ = "the expression of a source calls a function that the simulator does not know";
  }

  void write_fold(const ExpressionNode& node, std::string_view opening) {
    for (std::size_t i = 0; i + 1 < node.argument_count; ++i) text(opening);
    for (std::size_t i = 0; i < node.argument_count; ++i) {
      if (i > 0) text(",");
      write(pool_.argument(node, i));
      if (i > 0) text(")");
    }
  }

  using Points = std::vector<std::pair<double, double>>;

  // The x and y of a table; empty, with the trouble told, where they are not constants that rise in x.
  Points table_points(const ExpressionNode& node) {
    Points points;
    for (std::size_t i = 1; i + 1 < node.argument_count && trouble_.empty(); i += 2) {
      if (asks(pool_.argument(node, i)) || asks(pool_.argument(node, i + 1))) {
        trouble_ = "a table in the expression of a source has points that are no constants";
        break;
      }
      const auto x = constant(pool_.argument(node, i));
      const auto y = constant(pool_.argument(node, i + 1));
      if (!x || !y) break;
      if (!points.empty() && !(*x > points.back().first)) {
        trouble_ = "a table in the expression of a source does not rise from point to point";
      }
      points.emplace_back(*x, *y);
    }
    if (points.empty() && trouble_.empty()) trouble_ = "a table in the expression of a source has no points";
    return points;
  }

  // The sum of the pieces' rises. (The library's own pwl() goes on beyond its ends, and cuts its numbers short.)
  void write_table(const ExpressionNode& node) {
    const Points points = table_points(node);
    if (!trouble_.empty()) return;
    text("(");
    literal(points[0].second);
    for (std::size_t i = 1; i < points.size() && trouble_.empty(); ++i) {
      const double width = points[i].first - points[i - 1].first;
      text("+");
      literal((points[i].second - points[i - 1].second) / width);
      text("*min(max(");
      write(pool_.argument(node, 0));
      text("-");
      literal(points[i - 1].first);
      text(",0),");
      literal(width);
      text(")");
    }
    text(")");
  }

  std::string& out_;
  const model::ExpressionPool& pool_;
  double variable_;
  const LeafNames& leaves_;
  std::size_t begin_;
  int depth_ = 0;
  std::string trouble_;
  std::unordered_map<std::uint32_t, bool> asks_;
};

}  // namespace

base::Result<std::optional<double>> constant_value(const model::ExpressionPool& pool, model::ExpressionId tree,
                                                   double variable) {
  if (expression::is_behavioural(pool, tree)) return std::optional<double>{};
  expression::Leaves leaves;
  if (!std::isnan(variable)) leaves.variable = [variable](std::uint32_t) { return variable; };
  const auto value = expression::evaluate(pool, tree, leaves);
  if (const auto* number = std::get_if<double>(&value)) {
    if (std::isfinite(*number)) return std::optional<double>{*number};
    return base::Error{"the expression of a source has no finite value"};
  }
  return base::Error{"the expression of a source has no value: " + std::get<expression::Trouble>(value).message};
}

base::Result<base::Done> append_expression(std::string& out, const model::ExpressionPool& pool,
                                           model::ExpressionId tree, double variable, const LeafNames& leaves) {
  Writer writer(out, pool, variable, leaves);
  writer.write(tree);
  if (!writer.trouble().empty()) return base::Error{writer.trouble()};
  return base::Done{};
}

}  // namespace simulate
