// Memory for large vectors. The first touch of a small page costs far more than filling it, so that what is large is
// put into large pages where the system has them.
#pragma once

#include <cstddef>
#include <new>
#include <vector>

namespace base {

// Memory for `bytes` bytes. From an eighth of a large page (of 2 MiB) on it begins at a large page and the system is
// asked for such pages: advice only, where it is not taken nothing else changes. Throws std::bad_alloc as operator new
// does.
[[nodiscard]] void* take_memory(std::size_t bytes);

// Gives back what take_memory() gave for as many bytes.
void give_memory_back(void* memory, std::size_t bytes) noexcept;

template <class T>
struct PageAllocator {
  using value_type = T;
  static_assert(alignof(T) <= __STDCPP_DEFAULT_NEW_ALIGNMENT__);

  PageAllocator() = default;
  template <class U>
  PageAllocator(const PageAllocator<U>&) noexcept {}  // NOLINT: an allocator of any type is one of any other

  [[nodiscard]] T* allocate(std::size_t count) {
    if (count > static_cast<std::size_t>(-1) / 2 / sizeof(T)) throw std::bad_array_new_length();
    return static_cast<T*>(take_memory(count * sizeof(T)));
  }
  void deallocate(T* memory, std::size_t count) noexcept { give_memory_back(memory, count * sizeof(T)); }

  template <class U>
  friend bool operator==(const PageAllocator&, const PageAllocator<U>&) {
    return true;
  }
};

// A vector that may grow large.
template <class T>
using LargeVector = std::vector<T, PageAllocator<T>>;

}  // namespace base
