// Typed 32-bit indices: a net number and an element number cannot be mixed up.
#pragma once

#include <compare>
#include <cstddef>
#include <cstdint>
#include <functional>
#include <limits>

namespace base {

// An index into the vector that owns things of kind Tag. A default-made Id is "none".
template <class Tag>
struct Id {
  static constexpr std::uint32_t none_value = std::numeric_limits<std::uint32_t>::max();

  std::uint32_t value = none_value;

  [[nodiscard]] constexpr bool valid() const { return value != none_value; }
  [[nodiscard]] constexpr std::size_t index() const { return value; }

  friend constexpr auto operator<=>(Id, Id) = default;
};

}  // namespace base

template <class Tag>
struct std::hash<base::Id<Tag>> {
  std::size_t operator()(base::Id<Tag> id) const noexcept { return std::hash<std::uint32_t>{}(id.value); }
};
