// Text that is fit to be shown: numbers with SI prefixes, names without control characters.
#pragma once

#include <string>
#include <string_view>

namespace base {

// A number with an SI prefix and its unit, at most `digits` significant digits, no trailing zeros: si_text(4700, "ohm")
// is "4.7 kohm", si_text(1e-7, "A") is "100 nA", si_text(0, "V") is "0 V". Outside 1e-15..1e18 in plain scientific
// form.
[[nodiscard]] std::string si_text(double value, std::string_view unit, int digits = 4);

// A number with at most `digits` significant digits, no trailing zeros, scientific only beyond 1e-5..1e7. Digits before
// the point are always all shown.
[[nodiscard]] std::string number_text(double value, int digits = 4);

// `text` with every control character (C0, DEL, C1, and those of Unicode that turn, join or hide text) and every byte
// that is not UTF-8 written as \xNN, so that it is harmless on a terminal. Printable UTF-8 stays as it is.
[[nodiscard]] std::string printable(std::string_view text);

// printable(), of a text of more than `most` bytes only the first two thirds and the last third of `most`, "..."
// between them; no character is split.
[[nodiscard]] std::string printable_short(std::string_view text, std::size_t most = 80);

}  // namespace base
