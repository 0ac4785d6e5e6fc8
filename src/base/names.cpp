#include "base/names.hpp"

#include <algorithm>
#include <cstring>
#include <numeric>
#include <string>

namespace base {
namespace {

constexpr char fold(char c) {
  return c >= 'A' && c <= 'Z' ? static_cast<char>(c + ('a' - 'A')) : c;
}

// Up to eight bytes of a text as one number: equal texts of one length give the same number, others another one.
std::uint64_t word_of(const char* text, std::size_t size) {
  std::uint64_t word = 0;
  if (size >= 8) {
    std::memcpy(&word, text, 8);
  } else if (size >= 4) {
    std::uint32_t low = 0;
    std::uint32_t high = 0;
    std::memcpy(&low, text, 4);
    std::memcpy(&high, text + size - 4, 4);
    word = low | std::uint64_t{high} << 32U;
  } else if (size > 0) {
    const auto byte = [text](std::size_t at) { return std::uint64_t{static_cast<unsigned char>(text[at])}; };
    word = byte(0) | byte(size / 2) << 8U | byte(size - 1) << 16U;
  }
  return word;
}

// The same with ASCII capitals folded, all eight bytes at once.
constexpr std::uint64_t fold_word(std::uint64_t word) {
  constexpr std::uint64_t each = 0x0101010101010101U;
  const std::uint64_t low = word & (each * 0x7fU);
  const std::uint64_t from_a = low + each * (0x80U - 'A');    // its high bits: at least A
  const std::uint64_t behind_z = low + each * (0x7fU - 'Z');  // beyond Z
  const std::uint64_t capitals = (from_a ^ behind_z) & ~word & (each * 0x80U);
  return word | capitals >> 2U;
}

// Calls `see` with the folded words of a text, the last of which may overlap the one before.
template <class See>
void for_each_word(std::string_view text, const See& see) {
  std::size_t at = 0;
  for (; at + 8 < text.size(); at += 8) see(fold_word(word_of(text.data() + at, 8)));
  const std::size_t last = text.size() <= 8 ? 0 : text.size() - 8;
  see(fold_word(word_of(text.data() + last, text.size() - last)));
}

// Over the folded bytes but the last, well mixed (multiplication and fold, the finalizer of splitmix64); the last byte
// fills the low bits. So R1230 to R1239, which netlists name one after the other, lie in one cache line of the table.
std::uint32_t hash_of(std::string_view text) {
  constexpr std::uint32_t line_bits = 3;
  if (text.empty()) return 0;
  std::uint64_t hash = text.size() * 0x9e3779b97f4a7c15U;
  for_each_word(text.substr(0, text.size() - 1), [&hash](std::uint64_t word) {
    hash = (hash ^ word) * 0xbf58476d1ce4e5b9U;
    hash ^= hash >> 32U;
  });
  hash *= 0x94d049bb133111ebU;
  hash ^= hash >> 31U;
  const auto last = static_cast<std::uint32_t>(static_cast<unsigned char>(fold(text.back())));
  return (static_cast<std::uint32_t>(hash) << line_bits) ^ last;
}

// Blocks grow with what is kept, so that a large table lies in large pages and a small one stays small.
constexpr std::size_t least_block = std::size_t{1} << 16;
constexpr std::size_t largest_block = std::size_t{1} << 23;
constexpr std::size_t bytes_per_name = 8;  // of many names, about

}  // namespace

bool same_name(std::string_view a, std::string_view b) {
  if (a.size() != b.size()) return false;
  std::size_t at = 0;
  for (; at + 8 < a.size(); at += 8) {
    if (fold_word(word_of(a.data() + at, 8)) != fold_word(word_of(b.data() + at, 8))) return false;
  }
  const std::size_t last = a.size() <= 8 ? 0 : a.size() - 8;
  return fold_word(word_of(a.data() + last, a.size() - last)) == fold_word(word_of(b.data() + last, b.size() - last));
}

std::string folded(std::string_view text) {
  std::string out(text);
  std::transform(out.begin(), out.end(), out.begin(), fold);
  return out;
}

NameTable::NameTable() : slots_(64) {}

void NameTable::reserve(std::size_t names) {
  std::size_t slots = slots_.size();
  while (slots < names * 2) slots *= 2;
  if (slots != slots_.size()) grow(slots);
  texts_.reserve(names);
  add_block(names * bytes_per_name);
}

std::size_t NameTable::slot_of(std::string_view text, std::uint32_t hash) const {
  const std::size_t mask = slots_.size() - 1;
  std::size_t at = hash & mask;
  while (slots_[at].id != NameId::none_value) {
    if (slots_[at].hash == hash && same_name(texts_[slots_[at].id], text)) break;
    at = (at + 1) & mask;
  }
  return at;
}

void NameTable::grow(std::size_t slots) {
  LargeVector<Slot> old(slots);
  old.swap(slots_);
  const std::size_t mask = slots_.size() - 1;
  for (const Slot& slot : old) {
    if (slot.id == NameId::none_value) continue;
    std::size_t at = slot.hash & mask;
    while (slots_[at].id != NameId::none_value) at = (at + 1) & mask;
    slots_[at] = slot;
  }
}

void NameTable::add_block(std::size_t bytes) {
  blocks_.emplace_back().reserve(bytes);
  kept_bytes_ += bytes;
}

// Blocks never grow, so that views into them stay good.
std::string_view NameTable::keep(std::string_view text) {
  if (blocks_.empty() || blocks_.back().capacity() - blocks_.back().size() < text.size())
    add_block(std::max(std::clamp(kept_bytes_, least_block, largest_block), text.size()));
  LargeVector<char>& block = blocks_.back();
  const std::size_t begin = block.size();
  block.insert(block.end(), text.begin(), text.end());
  return {block.data() + begin, text.size()};
}

NameId NameTable::intern(std::string_view text) {
  const std::uint32_t hash = hash_of(text);
  std::size_t at = slot_of(text, hash);
  if (slots_[at].id != NameId::none_value) return NameId{slots_[at].id};
  if ((texts_.size() + 1) * 2 > slots_.size()) {
    grow(slots_.size() * 2);
    at = slot_of(text, hash);
  }
  const auto id = static_cast<std::uint32_t>(texts_.size());
  texts_.push_back(keep(text));
  slots_[at] = Slot{hash, id};
  return NameId{id};
}

void NameTable::prepare(std::string_view text) const {
  __builtin_prefetch(&slots_[hash_of(text) & (slots_.size() - 1)]);
}

std::optional<NameId> NameTable::find(std::string_view text) const {
  const Slot& slot = slots_[slot_of(text, hash_of(text))];
  if (slot.id == NameId::none_value) return std::nullopt;
  return NameId{slot.id};
}

bool glob_match(std::string_view glob, std::string_view name) {
  std::size_t g = 0;
  std::size_t n = 0;
  std::size_t star = std::string_view::npos;
  std::size_t resume = 0;
  while (n < name.size()) {
    if (g < glob.size() && (glob[g] == '?' || (glob[g] != '*' && fold(glob[g]) == fold(name[n])))) {
      ++g;
      ++n;
    } else if (g < glob.size() && glob[g] == '*') {
      star = g++;
      resume = n;
    } else if (star != std::string_view::npos) {
      g = star + 1;
      n = ++resume;
    } else {
      return false;
    }
  }
  while (g < glob.size() && glob[g] == '*') ++g;
  return g == glob.size();
}

namespace {

std::size_t edit_distance(std::string_view a, std::string_view b) {
  std::vector<std::size_t> row(b.size() + 1);
  std::iota(row.begin(), row.end(), std::size_t{0});
  for (std::size_t i = 1; i <= a.size(); ++i) {
    std::size_t diagonal = row[0];
    row[0] = i;
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t swap = diagonal + (fold(a[i - 1]) == fold(b[j - 1]) ? 0 : 1);
      diagonal = row[j];
      row[j] = std::min({row[j] + 1, row[j - 1] + 1, swap});
    }
  }
  return row[b.size()];
}

}  // namespace

std::string_view nearest_name(std::string_view wanted, const std::vector<std::string_view>& candidates) {
  constexpr std::size_t longest = 200;  // a name longer than this is no slip of the pen
  if (wanted.empty() || wanted.size() > longest) return {};
  std::size_t best = wanted.size() < 4 ? 1 : 1 + wanted.size() / 3;
  std::string_view found;
  for (const std::string_view candidate : candidates) {
    const std::size_t difference =
        candidate.size() > wanted.size() ? candidate.size() - wanted.size() : wanted.size() - candidate.size();
    if (difference > best || candidate.size() > longest) continue;
    const std::size_t distance = edit_distance(wanted, candidate);
    if (distance < best || (distance == best && found.empty())) {
      best = distance;
      found = candidate;
    }
  }
  return found;
}

}  // namespace base
