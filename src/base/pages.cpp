#include "base/pages.hpp"

#include <cstdint>
#include <sys/mman.h>

namespace base {
namespace {

constexpr std::size_t large_page = std::size_t{2} << 20U;

// What is smaller wastes more of a large page than its small pages cost.
constexpr bool is_large(std::size_t bytes) {
  return bytes >= large_page / 8;
}

constexpr std::size_t in_whole_pages(std::size_t bytes) {
  return (bytes + large_page - 1) / large_page * large_page;
}

// Maps one page more than is wanted, and gives back what lies before and behind the whole pages in it.
void* map_whole_pages(std::size_t bytes) {
  constexpr int flags = MAP_PRIVATE | MAP_ANONYMOUS;
  void* const mapped = ::mmap(nullptr, bytes + large_page, PROT_READ | PROT_WRITE, flags, -1, 0);
  if (mapped == MAP_FAILED) throw std::bad_alloc();
  const std::size_t before =
      in_whole_pages(reinterpret_cast<std::uintptr_t>(mapped)) - reinterpret_cast<std::uintptr_t>(mapped);
  char* const begin = static_cast<char*>(mapped) + before;
  if (before > 0) (void)::munmap(mapped, before);
  (void)::munmap(begin + bytes, large_page - before);
  return begin;
}

}  // namespace

// Not from the heap: what it holds has been touched in small pages, and it would be given back page by page.
void* take_memory(std::size_t bytes) {
  if (!is_large(bytes)) return ::operator new(bytes);
  const std::size_t whole = in_whole_pages(bytes);
  void* const memory = map_whole_pages(whole);
#ifdef MADV_HUGEPAGE
  (void)::madvise(memory, whole, MADV_HUGEPAGE);
#endif
  return memory;
}

void give_memory_back(void* memory, std::size_t bytes) noexcept {
  if (!is_large(bytes)) return ::operator delete(memory);
  (void)::munmap(memory, in_whole_pages(bytes));
}

}  // namespace base
