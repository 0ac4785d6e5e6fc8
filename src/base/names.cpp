#include "base/names.hpp"

#include <algorithm>
#include <cstring>
#include <numeric>
#include <string>

#include "base/pages.hpp"

namespace base {
namespace {

constexpr char fold(char c) {
  return c >= 'A' && c <= 'Z' ? static_cast<char>(c + ('a' - 'A')) : c;
}

// FNV-1a over the folded bytes but the last, well mixed; the last byte fills the low bits. So R1230 to R1239, which
// netlists name one after the other, lie in one cache line of the table.
std::uint32_t hash_of(std::string_view text) {
  constexpr std::uint32_t line_bits = 3;
  if (text.empty()) return 0;
  std::uint32_t hash = 2166136261U;
  for (const char c : text.substr(0, text.size() - 1)) hash = (hash ^ static_cast<unsigned char>(fold(c))) * 16777619U;
  hash ^= hash >> 15;
  hash *= 0x2c1b3c6dU;
  hash ^= hash >> 13;
  const auto last = static_cast<std::uint32_t>(static_cast<unsigned char>(fold(text.back())));
  return (hash << line_bits) ^ last;
}

// Blocks grow with what is kept, so that a large table lies in large pages and a small one stays small.
constexpr std::size_t least_block = std::size_t{1} << 16;
constexpr std::size_t largest_block = std::size_t{1} << 23;

}  // namespace

bool same_name(std::string_view a, std::string_view b) {
  return a.size() == b.size() &&
         std::equal(a.begin(), a.end(), b.begin(), [](char x, char y) { return fold(x) == fold(y); });
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
  make_room(texts_, names);
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
  std::vector<Slot> old;
  make_room(old, slots);
  old.resize(slots);
  old.swap(slots_);
  const std::size_t mask = slots_.size() - 1;
  for (const Slot& slot : old) {
    if (slot.id == NameId::none_value) continue;
    std::size_t at = slot.hash & mask;
    while (slots_[at].id != NameId::none_value) at = (at + 1) & mask;
    slots_[at] = slot;
  }
}

std::string_view NameTable::keep(std::string_view text) {
  if (text.size() > block_left_) {
    const std::size_t bytes = std::max(std::clamp(kept_bytes_, least_block, largest_block), text.size());
    kept_bytes_ += bytes;
    blocks_.push_back(std::make_unique_for_overwrite<char[]>(bytes));
    block_next_ = blocks_.back().get();
    prefer_large_pages(block_next_, bytes);
    block_left_ = bytes;
  }
  char* const start = block_next_;
  if (!text.empty()) std::memcpy(start, text.data(), text.size());
  block_next_ += text.size();
  block_left_ -= text.size();
  return {start, text.size()};
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
