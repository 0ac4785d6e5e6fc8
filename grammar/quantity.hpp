// What a quantity may be: numbers with a prefix and a unit, marking codes (IEC 60062 clause 4), tolerances. Rules and
// their error texts only; what they mean is for parse/ to say.
#pragma once

#include <tao/pegtl.hpp>

namespace grammar::quantity {

namespace pegtl = tao::pegtl;
using pegtl::at;
using pegtl::digit;
using pegtl::eof;
using pegtl::istring;
using pegtl::not_at;
using pegtl::one;
using pegtl::opt;
using pegtl::plus;
using pegtl::seq;
using pegtl::sor;
using pegtl::star;
using pegtl::string;

inline constexpr const char* literal_expected = "expected a number such as 10k, 4k7, 2.2u or 1e3";
inline constexpr const char* out_of_range = "is too large or too small for a number";
inline constexpr const char* comma_unclear =
    "may be a decimal comma or a separator of thousands; write a point, or no comma";
inline constexpr const char* tolerance_unclear =
    "leaves open where the value ends and the tolerance begins; put a blank between them";
inline constexpr const char* tolerance_too_large = "has a tolerance of 100 % or more";

// Signs beyond ASCII: UTF-8, and Latin-1 where older files have it.
struct micro : sor<string<'\xC2', '\xB5'>, string<'\xCE', '\xBC'>, string<'\xB5'>> {};
struct ohm_sign : sor<string<'\xCE', '\xA9'>, string<'\xE2', '\x84', '\xA6'>> {};
struct plus_minus : sor<string<'\xC2', '\xB1'>, string<'\xB1'>, string<'+', '/', '-'>, string<'+', '-'>> {};
struct blank : sor<one<' ', '\t'>, string<'\xC2', '\xA0'>, string<'\xA0'>> {};

struct letter : sor<pegtl::alpha, ohm_sign> {};
struct word_end : not_at<sor<pegtl::alnum, one<'_'>>> {};

// Numbers.
struct sign : one<'+', '-'> {};
struct whole : plus<digit> {};
struct fraction : plus<digit> {};
struct exponent : seq<opt<one<'+', '-'>>, plus<digit>> {};
struct power : seq<one<'e', 'E', 'd', 'D'>, exponent> {};
struct comma : one<','> {};
struct mantissa : sor<seq<whole, opt<one<'.'>, opt<fraction>>>, seq<one<'.'>, fraction>> {};
struct number : seq<mantissa, opt<power>> {};
struct comma_number : seq<whole, comma, fraction> {};

// Marking codes: the letter stands where the point would be.
struct point_letter
    : sor<micro, one<'R', 'r', 'V', 'v', 'k', 'K', 'M', 'm', 'G', 'g', 'T', 't', 'u', 'U', 'n', 'N', 'p', 'P'>> {};
struct marked_fraction : pegtl::rep_min_max<1, 3, digit> {};
struct marked_middle : seq<whole, point_letter, marked_fraction> {};
struct lead_fraction : pegtl::rep_min_max<1, 5, digit> {};
struct marked_lead : seq<one<'R', 'r'>, lead_fraction> {};
struct marked_end : not_at<one<'.', ',', '%'>> {};
struct marked : sor<seq<at<marked_middle, marked_end>, marked_middle>, seq<at<marked_lead, marked_end>, marked_lead>> {
};

// ---- A literal of a netlist, as the board's builder means it ----

struct meg : istring<'m', 'e', 'g'> {};
struct mil : istring<'m', 'i', 'l'> {};
struct scale_letter : sor<micro, one<'f', 'F', 'p', 'P', 'n', 'N', 'u', 'U', 'm', 'M', 'k', 'K', 'g', 'G', 't', 'T'>> {
};
struct scale : sor<meg, mil, scale_letter> {};

// Tolerance letters of IEC 60062 clause 5: all of them after a code with its letter in the middle; after the others
// only the common ones, and no letter that would be a unit or a potentiometer's taper there.
struct any_tolerance_letter : one<'E', 'L', 'P', 'W', 'B', 'C', 'D', 'F', 'G', 'H', 'J', 'K', 'M', 'N'> {};
struct common_tolerance_letter : one<'F', 'G', 'J', 'K', 'M'> {};
struct mega_tolerance_letter : one<'G', 'J', 'K', 'M'> {};
struct coded_scale : one<'k', 'K', 'G'> {};
struct coded_mega : one<'M'> {};
struct coded_end : sor<seq<coded_scale, at<common_tolerance_letter, word_end>, common_tolerance_letter>,
                       seq<coded_mega, at<mega_tolerance_letter, word_end>, mega_tolerance_letter>,
                       seq<one<'R'>, at<common_tolerance_letter, word_end>, common_tolerance_letter>> {};
struct coded : seq<at<coded_end>, coded_end> {};

struct unit_word : seq<sor<istring<'o', 'h', 'm', 's'>, istring<'o', 'h', 'm'>, ohm_sign, istring<'v', 'd', 'c'>,
                           one<'R', 'F', 'H', 'V', 'A'>>,
                       word_end> {};
struct unit_word_after_scale : seq<sor<unit_word, one<'r', 'f', 'h', 'v', 'a'>>, word_end> {};

// Letters that stand right behind number and suffix mean nothing, as in SPICE.
struct glued : sor<coded, seq<opt<scale>, star<letter>, opt<plus<blank>, unit_word>>> {};

// A blank before suffix and unit: SPICE sees two words there.
struct spaced_unit : seq<plus<blank>, unit_word> {};
struct spaced_scale : seq<plus<blank>, scale, opt<star<blank>, unit_word_after_scale>, word_end> {};
struct spaced : sor<seq<at<spaced_unit>, spaced_unit>, seq<at<spaced_scale>, spaced_scale>> {};

struct condition : seq<one<'@'>, plus<not_at<sor<blank, one<'%'>>>, pegtl::any>> {};
struct percent : sor<seq<plus<digit>, opt<one<'.', ','>, plus<digit>>>, seq<one<'.', ','>, plus<digit>>> {};
struct percent_end : seq<star<blank>, one<'%'>> {};
struct separator : sor<plus_minus, one<'-', '/', ','>> {};
struct separated_tolerance : seq<sor<seq<star<blank>, separator, star<blank>>, plus<blank>>, percent, percent_end> {};
struct glued_percent : percent {};
struct glued_tolerance : seq<glued_percent, percent_end> {};
struct tolerance : sor<seq<at<separated_tolerance>, separated_tolerance>, seq<at<glued_tolerance>, glued_tolerance>> {};

// A voltage or power rating, said but not used: 100n/50V.
struct rating : seq<sor<one<'/', '_'>, plus<blank>>, plus<digit>, opt<one<'.'>, plus<digit>>, opt<one<'m'>>,
                    one<'V', 'W'>, word_end> {};

struct marked_literal : seq<marked, opt<at<any_tolerance_letter, word_end>, any_tolerance_letter>, star<letter>> {};
struct plain_literal : seq<sor<seq<at<comma_number>, comma_number>, number>, sor<spaced, glued>> {};
struct literal : seq<star<blank>, opt<sign>, sor<marked_literal, plain_literal>, opt<condition>, opt<tolerance>,
                     opt<rating>, star<blank>, eof> {};

// ---- The same text as SPICE takes it: words, each the longest number at its beginning, one suffix, the rest ignored
// ----

namespace spice {

struct micro : sor<string<'\xC2', '\xB5'>, string<'\xB5'>> {};  // Greek mu is no suffix to it
struct exponent : seq<opt<one<'+', '-'>>, star<digit>> {};      // none at all is 0
struct power : seq<one<'e', 'E', 'd', 'D'>, exponent> {};
struct scale_letter : sor<micro, one<'f', 'F', 'p', 'P', 'n', 'N', 'u', 'U', 'm', 'M', 'k', 'K', 'g', 'G', 't', 'T'>> {
};
struct value : seq<opt<sign>, mantissa, opt<power>, opt<sor<meg, mil, scale_letter>>> {};

}  // namespace spice

// ---- A quantity of a declaration ----

struct unit_text : star<pegtl::any> {};
struct quantity : seq<star<blank>, opt<sign>, sor<marked, number>, star<blank>, unit_text, eof> {};

}  // namespace grammar::quantity
