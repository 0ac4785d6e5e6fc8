#include "parse/expression/expression.hpp"

#include <algorithm>
#include <fmt/format.h>

#include "base/text.hpp"
#include "grammar/expression.hpp"
#include "parse/expression/tree.hpp"

namespace parse {
namespace {

namespace pegtl = tao::pegtl;
namespace rules = grammar::expression;
using Input = pegtl::memory_input<pegtl::tracking_mode::lazy, pegtl::eol::lf_crlf>;

constexpr std::uint64_t deepest = 1000;  // of brackets: each takes a part of the stack

struct State {
  TreeBuilder tree;
  const char* text;
  std::uint32_t offset;
  std::string_view first_net;
  std::string_view second_net;
  std::uint32_t probe = 0;

  template <typename ActionInput>
  [[nodiscard]] std::uint32_t place(const ActionInput& in) const {
    return offset + static_cast<std::uint32_t>(in.begin() - text);
  }
};

// What stands where something else was expected: the rest of the word, or the end.
std::string found(const char* at, const char* end) {
  if (at == end) return "the end";
  const std::string_view rest(at, static_cast<std::size_t>(end - at));
  const bool word = std::string_view(",()").find(rest.front()) == std::string_view::npos;
  const auto stop = word ? rest.find_first_of(" \t,()", 1) : std::size_t{1};
  return fmt::format("\"{}\"", base::printable_short(rest.substr(0, stop), 40));
}

template <typename Rule>
struct Control : pegtl::normal<Rule> {
  template <typename ParseInput, typename... States>
  [[noreturn]] static void raise(const ParseInput& in, State& state, States&&... /*rest*/) {
    throw ExpressionFailure{state.offset + static_cast<std::uint32_t>(in.current() - state.text),
                            fmt::format("{}, found {}", rules::expected<Rule>, found(in.current(), in.end()))};
  }
};

template <typename Rule>
struct Act : pegtl::nothing<Rule> {};

template <>
struct Act<rules::number> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.tree.number(in.string_view(), s.place(in));
  }
};
template <>
struct Act<rules::infix> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.tree.infix(in.string_view(), s.place(in));
  }
};
template <>
struct Act<rules::minus> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.tree.prefix('-', s.place(in));
  }
};
template <>
struct Act<rules::logical_not> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.tree.prefix('!', s.place(in));
  }
};
template <>
struct Act<rules::volts_begin> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.probe = s.place(in), s.second_net = {};
  }
};
template <>
struct Act<rules::first_net> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.first_net = in.string_view();
  }
};
template <>
struct Act<rules::second_net> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.second_net = in.string_view();
  }
};
template <>
struct Act<rules::amperes_begin> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.probe = s.place(in);
  }
};
template <>
struct Act<rules::source> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.first_net = in.string_view();
  }
};
template <>
struct Act<rules::group_begin> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.tree.open(s.place(in));
  }
};
template <>
struct Act<rules::brace_begin> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.tree.open(s.place(in));
  }
};

template <>
struct Act<rules::variable> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    s.tree.name(in.string_view(), s.place(in));
  }
};
template <>
struct Act<rules::call_begin> {
  template <typename ActionInput>
  static void apply(const ActionInput& in, State& s) {
    const std::string_view text = in.string_view();
    s.tree.open_call(text.substr(0, text.find_first_of(" \t\v\f(")), s.place(in));
  }
};
template <>
struct Act<rules::volts> {
  static void apply0(State& s) { s.tree.volts(s.first_net, s.second_net, s.probe); }
};
template <>
struct Act<rules::amperes> {
  static void apply0(State& s) { s.tree.amperes(s.first_net, s.probe); }
};
template <>
struct Act<rules::group_end> {
  static void apply0(State& s) { s.tree.close(); }
};
template <>
struct Act<rules::brace_end> {
  static void apply0(State& s) { s.tree.close(); }
};
template <>
struct Act<rules::argument_comma> {
  static void apply0(State& s) { s.tree.next_argument(); }
};
template <>
struct Act<rules::call_empty> {
  static void apply0(State& s) { s.tree.close_call(true); }
};
template <>
struct Act<rules::call_end> {
  static void apply0(State& s) { s.tree.close_call(false); }
};

ExpressionRead run(std::string_view text, Extent extent, State& state) {
  Input in(text.data(), text.data() + text.size(), "");
  if (extent == Extent::whole) {
    pegtl::parse<rules::whole, Act, Control>(in, state);
  } else {
    pegtl::parse<rules::leading, Act, Control>(in, state);
  }
  return {state.tree.finish(), static_cast<std::size_t>(in.current() - text.data()), {}};
}

}  // namespace

ExpressionRead read_expression(std::string_view text, std::uint32_t offset, Extent extent, std::uint64_t depth,
                               model::ExpressionPool& pool, base::NameTable& names) {
  const std::size_t nodes = pool.nodes.size();
  const std::size_t arguments = pool.arguments.size();
  State state{TreeBuilder(pool, names, std::min(depth, deepest)), text.data(), offset, {}, {}};
  try {
    return run(text, extent, state);
  } catch (ExpressionFailure& failure) {
    pool.nodes.resize(nodes);
    pool.arguments.resize(arguments);
    return {{}, 0, ExpressionFault{failure.offset, std::move(failure.message)}};
  }
}

}  // namespace parse
