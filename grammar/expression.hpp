// What an expression may be: operands between operators, brackets and calls. The grammar is flat: how tightly operators
// bind is for parse/ to say, so that only brackets nest here. Rules and their error texts only.
#pragma once

#include <tao/pegtl.hpp>

namespace grammar::expression {

namespace pegtl = tao::pegtl;
using pegtl::digit;
using pegtl::eof;
using pegtl::if_must;
using pegtl::must;
using pegtl::not_at;
using pegtl::one;
using pegtl::opt;
using pegtl::plus;
using pegtl::ranges;
using pegtl::seq;
using pegtl::sor;
using pegtl::star;
using pegtl::string;

struct gap : star<one<' ', '\t', '\v', '\f'>> {};
struct high_byte : ranges<'\x80', '\xff'> {};

// Numbers with whatever is glued to them: 10k, 4k7, 1e-3, 4.7kohm. What they are worth is settled elsewhere.
struct digits : plus<digit> {};
struct exponent : seq<one<'e', 'E'>, opt<one<'+', '-'>>, digits> {};
struct tail : star<sor<pegtl::alnum, one<'_'>, high_byte>> {};
struct number : seq<sor<seq<digits, opt<one<'.'>, star<digit>>>, seq<one<'.'>, digits>>, opt<exponent>, tail> {};

struct name_begin : sor<pegtl::alpha, one<'_'>, high_byte> {};
struct name_byte : sor<pegtl::alnum, one<'_', '.', '#', '$'>, high_byte> {};
struct name : seq<name_begin, star<name_byte>> {};

// V(net), V(net, net), I(source). Names of nets may hold signs, and brackets as in Net-(R1-Pad2).
struct open_bracket : one<'('> {};
struct close_bracket : one<')'> {};
struct net_byte : pegtl::not_one<' ', '\t', '\v', '\f', ',', '(', ')', '=', '{', '}', '\r', '\n', '\0'> {};
struct net_bracket : seq<open_bracket, star<net_byte>, close_bracket> {};
struct net : seq<net_byte, star<sor<net_byte, net_bracket>>> {};
struct first_net : net {};
struct second_net : net {};
struct net_comma : sor<seq<gap, one<','>, gap>, seq<plus<one<' ', '\t'>>, not_at<one<',', ')'>>>> {};
struct probe_end : close_bracket {};
struct volts_begin : seq<one<'v', 'V'>, gap, open_bracket> {};
struct volts : if_must<volts_begin, gap, first_net, opt<if_must<net_comma, second_net>>, gap, probe_end> {};
struct source : net {};
struct amperes_begin : seq<one<'i', 'I'>, gap, open_bracket> {};
struct amperes : if_must<amperes_begin, gap, source, gap, probe_end> {};

struct expression;

struct call_begin : seq<name, gap, open_bracket> {};
struct call_end : one<')'> {};
struct argument_comma : one<','> {};
struct call_empty : close_bracket {};
struct arguments : seq<expression, star<gap, argument_comma, gap, must<expression>>> {};
struct call : if_must<call_begin, gap, sor<call_empty, seq<arguments, gap, must<call_end>>>> {};

struct group_begin : one<'('> {};
struct group_end : one<')'> {};
struct group : if_must<group_begin, gap, expression, gap, group_end> {};
struct brace_begin : one<'{'> {};
struct brace_end : one<'}'> {};
struct braces : if_must<brace_begin, gap, expression, gap, brace_end> {};

struct variable : name {};
struct primary : sor<number, volts, amperes, call, variable, group, braces> {};

struct minus : one<'-'> {};
struct plus_sign : one<'+'> {};
struct logical_not : seq<one<'!'>, not_at<one<'='>>> {};
struct prefix : sor<minus, plus_sign, logical_not> {};
struct operand : sor<primary, if_must<plus<prefix, gap>, primary>> {};

struct infix
    : sor<string<'*', '*'>, string<'<', '='>, string<'>', '='>, string<'=', '='>, string<'!', '='>, string<'<', '>'>,
          string<'&', '&'>, string<'|', '|'>, one<'^', '*', '/', '%', '+', '-', '<', '>', '&', '|', '?', ':'>> {};
struct further : if_must<seq<gap, infix>, gap, operand> {};
struct expression : seq<operand, star<further>> {};

struct end : eof {};
struct leading : seq<gap, must<expression>> {};  // as much of a text as is an expression
struct whole : seq<leading, gap, must<end>> {};  // all of it

// Error texts: what was expected where a rule failed.
template <typename Rule>
inline constexpr const char* expected = "expected a number, a name or a bracket";
template <>
inline constexpr const char* expected<first_net> = "expected the name of a net";
template <>
inline constexpr const char* expected<second_net> = expected<first_net>;
template <>
inline constexpr const char* expected<source> = "expected the name of a voltage source";
template <>
inline constexpr const char* expected<probe_end> = "expected )";
template <>
inline constexpr const char* expected<group_end> = "expected an operator or )";
template <>
inline constexpr const char* expected<call_end> = "expected an operator, a comma or )";
template <>
inline constexpr const char* expected<brace_end> = "expected an operator or }";
template <>
inline constexpr const char* expected<end> = "expected an operator or the end of the expression";

}  // namespace grammar::expression
