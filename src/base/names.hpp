// Interned names. SPICE names are case-insensitive: "ADC_In" and "adc_in" are one NameId, spelled as first seen.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "base/id.hpp"
#include "base/pages.hpp"

namespace base {

using NameId = Id<struct NameTag>;

// Owns the text of every name. Equality folds ASCII letters only; other bytes count as they are.
class NameTable {
 public:
  NameTable();

  // The id of `text`; made on first sight, when the spelling is copied and kept for ever.
  NameId intern(std::string_view text);

  // The id of `text`, or nothing when it was never interned.
  [[nodiscard]] std::optional<NameId> find(std::string_view text) const;

  // Fetches what a search for `text` will look at first: a hint for texts that are interned a little later.
  void prepare(std::string_view text) const;

  // The first spelling of a valid id. The view stays good as long as the table lives.
  [[nodiscard]] std::string_view text(NameId id) const { return texts_[id.index()]; }

  [[nodiscard]] std::size_t size() const { return texts_.size(); }

  // Makes room for this many names at once.
  void reserve(std::size_t names);

 private:
  struct Slot {
    std::uint32_t hash = 0;
    std::uint32_t id = NameId::none_value;
  };

  [[nodiscard]] std::size_t slot_of(std::string_view text, std::uint32_t hash) const;
  void grow(std::size_t slots);
  std::string_view keep(std::string_view text);
  void add_block(std::size_t bytes);

  LargeVector<Slot> slots_;
  LargeVector<std::string_view> texts_;
  std::vector<LargeVector<char>> blocks_;  // the last has room
  std::size_t kept_bytes_ = 0;             // room in all blocks
};

// Whether two texts are one name: equal but for the case of ASCII letters.
[[nodiscard]] bool same_name(std::string_view a, std::string_view b);

// `text` with its ASCII capitals folded to small letters.
[[nodiscard]] std::string folded(std::string_view text);

// Whether `name` fits `glob`, where only * (any run) and ? (any one byte) are special; case is folded.
[[nodiscard]] bool glob_match(std::string_view glob, std::string_view name);

// The candidate nearest to `wanted` by edit distance, if near enough to be a likely slip of the pen; else empty.
[[nodiscard]] std::string_view nearest_name(std::string_view wanted, const std::vector<std::string_view>& candidates);

}  // namespace base
