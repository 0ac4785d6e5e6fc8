// Numbers as decks hold them. All are finite and none is a negative zero: the deck writer sees to that.
#pragma once

#include <cstdint>
#include <string>

namespace simulate {

// Appends an unsigned number in decimal.
void append_index(std::string& out, std::size_t index);

// Appends the shortest plain decimal number that reads back as `value`; for element lines and models.
void append_number(std::string& out, double value);

// Appends `value` for use inside an expression of a behavioural source, in parentheses where it is no plain number. The
// library prints such numbers again with 11 digits, so a longer one is written as the sum of two that are short.
void append_literal(std::string& out, double value);

}  // namespace simulate
