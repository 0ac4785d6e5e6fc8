// The bytes of a text, which may be many.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>

#include "base/pages.hpp"

namespace source {

// Owns bytes as a std::string does, and is read as a std::string_view. Bytes of a large text lie in large pages.
class Bytes {
 public:
  Bytes() = default;
  Bytes(std::string_view text) : bytes_(text.begin(), text.end()) {}     // NOLINT: converts on purpose
  Bytes(const std::string& text) : Bytes(std::string_view(text)) {}      // NOLINT: converts on purpose
  Bytes(const char* text) : Bytes(std::string_view(text)) {}             // NOLINT: converts on purpose
  operator std::string_view() const { return {bytes_.data(), size()}; }  // NOLINT: converts on purpose

  // New bytes are zero.
  void resize(std::size_t size) { bytes_.resize(size); }
  [[nodiscard]] char* data() { return bytes_.data(); }
  [[nodiscard]] const char* data() const { return bytes_.data(); }
  [[nodiscard]] std::size_t size() const { return bytes_.size(); }

 private:
  base::LargeVector<char> bytes_;
};

}  // namespace source
