// The short way to the numbers that most cards hold.
#pragma once

#include <optional>
#include <string_view>

namespace parse {

// The value of a plain decimal number, perhaps with one of the suffixes k, meg, m (small), u, n, p, g, t as its last
// letters: 4700, 4.7k, 1e-3, 100n. Exactly what read_literal gives, and only where both its readings agree; nothing for
// all else.
[[nodiscard]] std::optional<double> plain_number(std::string_view text);

}  // namespace parse
