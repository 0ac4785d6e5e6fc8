// The rules of grammar/quantity.hpp: what each takes, and how many bytes it leaves.
#include "grammar/quantity.hpp"

#include <optional>
#include <string_view>

#include <catch2/catch.hpp>
#include <tao/pegtl/contrib/analyze.hpp>

namespace q = grammar::quantity;

namespace {

// The bytes that Rule leaves of the text; nothing when it does not match.
template <class Rule>
std::optional<std::size_t> left(std::string_view text) {
  tao::pegtl::memory_input input(text.data(), text.data() + text.size(), "");
  if (!tao::pegtl::parse<Rule>(input)) return std::nullopt;
  return input.size();
}

constexpr std::nullopt_t refused = std::nullopt;

}  // namespace

TEST_CASE("no rule of quantities loops without taking a byte") {
  CHECK(tao::pegtl::analyze<q::literal>() == 0);
  CHECK(tao::pegtl::analyze<q::quantity>() == 0);
  CHECK(tao::pegtl::analyze<q::spice::value>() == 0);
}

TEST_CASE("a mantissa takes digits and one point") {
  CHECK(left<q::mantissa>("12") == 0U);
  CHECK(left<q::mantissa>("12.5k") == 1U);
  CHECK(left<q::mantissa>(".5") == 0U);
  CHECK(left<q::mantissa>("5.") == 0U);
  CHECK(left<q::mantissa>("1.2.3") == 2U);
  CHECK(left<q::mantissa>(".") == refused);
  CHECK(left<q::mantissa>("k") == refused);
}

TEST_CASE("an exponent needs digits, or its letter is left") {
  CHECK(left<q::number>("1e3") == 0U);
  CHECK(left<q::number>("1E-3") == 0U);
  CHECK(left<q::number>("1e") == 1U);
  CHECK(left<q::number>("1e+k") == 3U);
}

TEST_CASE("a marking code has one to three digits behind its letter, or R before up to five") {
  CHECK(left<q::marked>("4k7") == 0U);
  CHECK(left<q::marked>("4k702") == 0U);
  CHECK(left<q::marked>("1N4148") == refused);
  CHECK(left<q::marked>("R0005") == 0U);
  CHECK(left<q::marked>("R") == refused);
  CHECK(left<q::marked>("4k7.1") == refused);
  CHECK(left<q::marked>("1k5%") == refused);
}

TEST_CASE("signs beyond ASCII are taken whole") {
  CHECK(left<q::micro>("\xC2\xB5") == 0U);
  CHECK(left<q::micro>("\xCE\xBC") == 0U);
  CHECK(left<q::micro>("\xB5") == 0U);
  CHECK(left<q::ohm_sign>("\xCE\xA9") == 0U);
  CHECK(left<q::ohm_sign>("\xE2\x84\xA6") == 0U);
  CHECK(left<q::plus_minus>("\xC2\xB1") == 0U);
  CHECK(left<q::plus_minus>("+/-1") == 1U);
  CHECK(left<q::ohm_sign>("\xCE") == refused);
}

TEST_CASE("SPICE's value leaves what it does not understand") {
  CHECK(left<q::spice::value>("4k7") == 1U);
  CHECK(left<q::spice::value>("10MEGohm") == 3U);
  CHECK(left<q::spice::value>("1e") == 0U);
  CHECK(left<q::spice::value>("10\xCE\xBC") == 2U);
  CHECK(left<q::spice::value>("R10") == refused);
}

TEST_CASE("a literal is all of the text or nothing") {
  CHECK(left<q::literal>(" 10k 1% ") == 0U);
  CHECK(left<q::literal>("10 k\xCE\xA9") == 0U);
  CHECK(left<q::literal>("10k (0805)") == refused);
  CHECK(left<q::literal>("") == refused);
}
