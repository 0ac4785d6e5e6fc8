// Memory for large vectors.
#pragma once

#include <cstddef>
#include <vector>

namespace base {

// Asks the system for large pages for `bytes` bytes from `begin` on. Advice only: where it is not taken, nothing
// changes.
void prefer_large_pages(void* begin, std::size_t bytes);

// Makes room for `count` values at once. The first touch of a small page costs far more than filling it, so that a
// large vector is put into large pages where the system has them.
template <class T>
void make_room(std::vector<T>& vector, std::size_t count) {
  vector.reserve(count);
  prefer_large_pages(vector.data(), vector.capacity() * sizeof(T));
}

}  // namespace base
