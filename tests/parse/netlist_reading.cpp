#include "netlist_reading.hpp"

#include <array>
#include <cmath>
#include <fmt/format.h>

namespace parse_test {
namespace {

std::string sign_of(model::Op op) {
  using model::Op;
  switch (op) {
    case Op::negate:
      return "neg";
    case Op::logical_not:
      return "!";
    case Op::add:
      return "+";
    case Op::subtract:
      return "-";
    case Op::multiply:
      return "*";
    case Op::divide:
      return "/";
    case Op::power:
      return "^";
    case Op::remainder:
      return "%";
    case Op::less:
      return "<";
    case Op::less_equal:
      return "<=";
    case Op::greater:
      return ">";
    case Op::greater_equal:
      return ">=";
    case Op::equal:
      return "==";
    case Op::not_equal:
      return "!=";
    case Op::logical_and:
      return "&&";
    case Op::logical_or:
      return "||";
    case Op::choose:
      return "?";
    default:
      return "op" + std::to_string(static_cast<int>(op));
  }
}

std::string function_name(model::Function function) {
  switch (function) {
    case model::Function::table:
      return "table";
    case model::Function::nominal:
      return "nominal";
    case model::Function::max:
      return "max";
    default:
      return "function" + std::to_string(static_cast<int>(function));
  }
}

std::string show_leaf(const model::ExpressionNode& node, const base::NameTable& names) {
  using model::Op;
  switch (node.op) {
    case Op::number:
      return node.number == node.spice ? fmt::format("{}", node.number) : fmt::format("{}|{}", node.number, node.spice);
    case Op::parameter:
      return std::string(names.text(node.name));
    case Op::net_volts:
      return node.name2.valid() ? fmt::format("V({},{})", names.text(node.name), names.text(node.name2))
                                : fmt::format("V({})", names.text(node.name));
    case Op::amperes:
      return fmt::format("I({})", names.text(node.name));
    case Op::temperature:
      return "temp";
    case Op::time:
      return "time";
    default:
      return {};
  }
}

}  // namespace

std::string show_tree(const model::ExpressionPool& pool, const base::NameTable& names, model::ExpressionId id) {
  const model::ExpressionNode& node = pool[id];
  if (std::string leaf = show_leaf(node, names); !leaf.empty()) return leaf;
  std::string out = "(";
  if (node.op == model::Op::call) {
    out += function_name(node.function);
  } else if (node.op == model::Op::user_call) {
    out += names.text(node.name);
  } else {
    out += sign_of(node.op);
  }
  for (std::size_t i = 0; i < node.argument_count; ++i) out += " " + show_tree(pool, names, pool.argument(node, i));
  return out + ")";
}

NetlistReading::NetlistReading(std::string text, const Files& files, const source::Limits& limits) {
  const source::SourceId root = sources_.add({"t.cir", std::move(text), {}});
  const parse::Includer include = [&](const std::string& wanted,
                                      source::Place asked) -> base::Result<source::SourceId> {
    for (const auto& [name, bytes] : files) {
      if (name == wanted) return sources_.add({name, bytes, asked});
    }
    return base::Error{"no such file"};
  };
  netlist_ = parse::read_netlist(root, sources_, names_, include, limits, diagnostics_);
}

std::string NetlistReading::name(base::NameId id) const {
  return id.valid() ? std::string(names_.text(id)) : std::string();
}

std::vector<std::string> NetlistReading::said() const {
  std::vector<std::string> out;
  for (const source::Diagnostic& diagnostic : diagnostics_) out.push_back(source::headline(sources_, diagnostic));
  return out;
}

std::string NetlistReading::words(model::Range range) const {
  std::string out;
  for (std::uint32_t i = 0; i < range.count; ++i)
    out += (i == 0 ? "" : " ") + name(netlist_.words[range.first + i].name);
  return out;
}

std::string NetlistReading::show(model::ExpressionId id) const {
  return show_tree(netlist_.expressions, names_, id);
}

std::string NetlistReading::show(const model::Value& value) const {
  if (const auto* const number = std::get_if<double>(&value)) return fmt::format("{}", *number);
  if (const auto* const word = std::get_if<base::NameId>(&value)) return "word " + name(*word);
  if (const auto* const id = std::get_if<model::ExpressionId>(&value)) return show(*id);
  if (const auto* const id = std::get_if<model::OddLiteralId>(&value)) {
    const model::OddLiteral& odd = netlist_.odd_literals[id->index()];
    std::string out = fmt::format("{}|{}", odd.builder, odd.spice);
    if (!std::isnan(odd.tolerance)) out += fmt::format("~{}", odd.tolerance);
    return odd.bare_mega ? out + " M" : out;
  }
  return "nothing";
}

std::string NetlistReading::assignments(model::Range range) const {
  std::string out;
  for (std::uint32_t i = 0; i < range.count; ++i) {
    const model::Assignment& assignment = netlist_.assignments[range.first + i];
    out += (i == 0 ? "" : " ") + name(assignment.key.name) + "=" + show(assignment.value);
  }
  return out;
}

std::string NetlistReading::show(const model::ElementCard& element) const {
  std::string out = fmt::format("{} {}({})", element.letter, name(element.name), words(element.nodes));
  if (element.reference.name.valid()) out += " " + name(element.reference.name);
  if (element.second_reference.valid()) out += " " + name(element.second_reference);
  if (!std::holds_alternative<std::monostate>(element.value))
    out += (element.drives_current ? " =A " : " = ") + show(element.value);
  if (element.switched_off) out += " off";
  if (element.parameters.count > 0) out += " " + assignments(element.parameters);
  return out;
}

std::string NetlistReading::element(std::string_view wanted) const {
  for (const model::Scope& scope : netlist_.scopes) {
    for (const model::ElementCard& card : scope.elements) {
      if (base::same_name(name(card.name), wanted)) return show(card);
    }
  }
  return "no such element";
}

std::string NetlistReading::show(const std::vector<model::ParameterCard>& parameters) const {
  std::string out;
  for (const model::ParameterCard& card : parameters)
    out += (out.empty() ? "" : " ") + name(card.name.name) + "=" + show(card.value);
  return out;
}

std::string NetlistReading::fates() const {
  std::array<int, 4> counts{};
  for (const model::CardRecord& card : netlist_.cards) ++counts[static_cast<std::size_t>(card.fate)];
  return fmt::format("{} {} {} {}", counts[0], counts[1], counts[2], counts[3]);
}

std::string one(const std::string& card) {
  const NetlistReading reading("title\n" + card + "\n");
  const std::vector<std::string> said = reading.said();
  if (!said.empty()) return said.front();
  return reading.top().elements.empty() ? "no element" : reading.show(reading.top().elements.front());
}

}  // namespace parse_test
