// Names and places of parts, as messages give them.
#pragma once

#include <string>
#include <string_view>

#include "judge/judge.hpp"

namespace judge {

// The element's name as first spelled, printable; "a part" where the view does not know it.
[[nodiscard]] std::string part_name(const BoardView& board, model::ElementId element);

// The net's name, "0" for ground; "a net" where the view does not know it.
[[nodiscard]] std::string net_name(const BoardView& board, model::NetId net);

// The element's card; no place where the view does not know it.
[[nodiscard]] source::Span part_place(const BoardView& board, model::ElementId element);

// The element itself, or null.
[[nodiscard]] const model::Element* element_of(const BoardView& board, model::ElementId element);

// The text that a span covers, printable and short; empty where there is none.
[[nodiscard]] std::string quoted(const source::Sources& sources, source::Span span);

// A name as the key of a TOML table: bare where TOML 1.0 allows it, else a basic string.
[[nodiscard]] std::string toml_key(std::string_view name);

}  // namespace judge
