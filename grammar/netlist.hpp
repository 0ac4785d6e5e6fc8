// How a netlist falls into lines, cards and words. Rules and their error texts only; what cards mean is for parse/ to
// say. Every byte sequence matches `text`: what cannot be a word is its own rule, so that nothing of a card is lost.
#pragma once

#include <array>
#include <cstddef>

#include <tao/pegtl.hpp>
#include <tao/pegtl/contrib/analyze_traits.hpp>

namespace grammar::netlist {

namespace pegtl = tao::pegtl;
using pegtl::at;
using pegtl::eof;
using pegtl::not_at;
using pegtl::not_one;
using pegtl::one;
using pegtl::opt;
using pegtl::plus;
using pegtl::seq;
using pegtl::sor;
using pegtl::star;
using pegtl::string;

inline constexpr char end_of_text = '\x1a';  // Ctrl-Z, the end of a text file in older systems

struct blank : one<' ', '\t', '\v', '\f'> {};
struct line_end : sor<string<'\r', '\n'>, one<'\n', '\r'>> {};
struct rest_of_line : star<not_one<'\r', '\n'>> {};
struct final_mark : seq<one<end_of_text>, eof> {};

// ---- Lines that hold no card ----

struct executable_mark : string<'*', '#'> {};  // looks like a comment, but SPICE runs it
struct comment_mark : sor<one<'*', ';', '$'>, string<'/', '/'>> {};
struct comment : seq<sor<executable_mark, comment_mark>, rest_of_line> {};
struct aside : seq<star<blank>, opt<comment>, line_end> {};
struct last_aside : seq<sor<seq<plus<blank>, opt<comment>>, comment>, at<sor<eof, final_mark>>> {};

// A card goes on behind the + of a later line; comments and empty lines may stand between.
struct continuation : seq<line_end, star<aside>, star<blank>, one<'+'>> {};

// ---- Words ----

namespace bytes {

constexpr bool ends_word(unsigned char c) {
  switch (c) {
    case ' ':
    case '\t':
    case '\v':
    case '\f':
    case '\r':
    case '\n':
    case '\0':
    case '\x1a':
    case ',':
    case '=':
    case '(':
    case ')':
    case '{':
    case ';':
      return true;
    default:
      return false;
  }
}

constexpr std::array<bool, 256> word_table() {
  std::array<bool, 256> table{};
  for (std::size_t c = 0; c < table.size(); ++c) table[c] = !ends_word(static_cast<unsigned char>(c));
  return table;
}

inline constexpr std::array<bool, 256> in_word = word_table();

constexpr bool word_byte(char c) {
  return in_word[static_cast<unsigned char>(c)];
}

}  // namespace bytes

// One or more bytes of a plain word. A table: this rule sees most bytes of a file.
struct word_run {
  using rule_t = word_run;
  using subs_t = pegtl::empty_list;

  template <typename ParseInput>
  [[nodiscard]] static bool match(ParseInput& in) {
    const char* const begin = in.current();
    const char* const end = in.end();
    const char* next = begin;
    while (next != end && bytes::word_byte(*next)) ++next;
    if (next == begin) return false;
    in.bump(static_cast<std::size_t>(next - begin));
    return true;
  }
};

// A bracket inside a word, Net-(R1-Pad2): it closes before any blank, comma or equals sign. The reach is bounded, so
// that a line of opening brackets costs no more than its length times this.
struct inner_bracket {
  using rule_t = inner_bracket;
  using subs_t = pegtl::empty_list;
  static constexpr std::size_t reach = 255;

  template <typename ParseInput>
  [[nodiscard]] static bool match(ParseInput& in) {
    const char* const begin = in.current();
    const std::size_t size = in.size(reach) < reach ? in.size(reach) : reach;
    std::size_t open = 0;
    for (std::size_t i = 0; i < size; ++i) {
      if (begin[i] == '(') {
        ++open;
      } else if (open == 0) {
        return false;
      } else if (begin[i] == ')') {
        if (--open == 0) return in.bump(i + 1), true;
      } else if (!bytes::word_byte(begin[i])) {
        return false;
      }
    }
    return false;
  }
};

// Open ... Close with everything between, over continuations too. Pairs nest where Open and Close differ; they are
// counted, not called, so that no depth of braces exhausts the stack.
template <char Open, char Close>
struct enclosed {
  using rule_t = enclosed;
  using subs_t = pegtl::empty_list;

  template <typename ParseInput>
  [[nodiscard]] static bool match(ParseInput& in) {
    if (in.empty() || in.peek_char() != Open) return false;
    auto mark = in.template mark<pegtl::rewind_mode::required>();
    in.bump(1);
    for (std::size_t open = 1; !in.empty();) {
      const char c = in.peek_char();
      if (c == Close) {
        in.bump(1);
        if (--open == 0) return mark(true);
      } else if (c == '\r' || c == '\n' || c == ';') {
        if (!skips_to_next_line(in)) return false;
      } else if (c == '\0' || c == end_of_text) {
        return false;
      } else {
        if (c == Open) ++open;
        in.bump(1);
      }
    }
    return false;
  }

 private:
  template <typename ParseInput>
  static bool skips_to_next_line(ParseInput& in) {
    return pegtl::match<seq<rest_of_line, continuation>, pegtl::apply_mode::nothing, pegtl::rewind_mode::required,
                        pegtl::nothing, pegtl::normal>(in);
  }
};

struct braced : enclosed<'{', '}'> {};
struct quoted : enclosed<'\'', '\''> {};
struct text_in_quotes : seq<one<'"'>, star<not_one<'"', '\r', '\n', '\0', end_of_text>>, one<'"'>> {};
struct plain : seq<not_at<one<'\''>>, word_run, star<sor<inner_bracket, word_run>>> {};
struct equals : one<'='> {};

// A brace or quote that its card never closes: the rest of the card goes with it.
struct rest_of_card : seq<rest_of_line, star<continuation, rest_of_line>> {};
struct unclosed_brace : seq<one<'{'>, rest_of_card> {};
struct unclosed_quote : seq<one<'\''>, rest_of_card> {};
struct stray_byte : sor<one<'\0'>, seq<one<end_of_text>, not_at<eof>>> {};

// What parts words. A comment in a line begins at a semicolon anywhere, at $ and // behind a blank.
struct separator : one<',', '(', ')'> {};
struct blanks : seq<plus<blank>, opt<sor<one<'$'>, string<'/', '/'>>, rest_of_line>> {};
struct line_comment : seq<one<';'>, rest_of_line> {};

struct item : sor<seq<not_at<one<'"'>>, plain>, blanks, equals, separator, braced, quoted, text_in_quotes, plain,
                  line_comment, unclosed_brace, unclosed_quote, stray_byte> {};
struct card : seq<item, star<sor<item, continuation>>> {};
struct line : sor<aside, last_aside, card> {};

// Any number of whole lines.
struct text : seq<star<not_at<sor<eof, final_mark>>, line>, opt<one<end_of_text>>, eof> {};

// Error texts.
template <typename Rule>
inline constexpr const char* error_text = nullptr;
template <>
inline constexpr const char* error_text<unclosed_brace> = "the { is never closed on this card";
template <>
inline constexpr const char* error_text<unclosed_quote> = "the ' is never closed on this card";
template <>
inline constexpr const char* error_text<stray_byte> = "a byte that no netlist holds";

}  // namespace grammar::netlist

namespace tao::pegtl {

template <typename Name>
struct analyze_traits<Name, grammar::netlist::word_run> : analyze_any_traits<> {};
template <typename Name>
struct analyze_traits<Name, grammar::netlist::inner_bracket> : analyze_any_traits<> {};
template <typename Name, char Open, char Close>
struct analyze_traits<Name, grammar::netlist::enclosed<Open, Close>> : analyze_any_traits<> {};

}  // namespace tao::pegtl
