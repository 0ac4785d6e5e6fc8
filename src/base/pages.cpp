#include "base/pages.hpp"

#include <cstdint>
#include <sys/mman.h>

namespace base {

void prefer_large_pages([[maybe_unused]] void* begin, [[maybe_unused]] std::size_t bytes) {
#ifdef MADV_HUGEPAGE
  constexpr std::size_t large = std::size_t{2} << 20U;
  const auto at = reinterpret_cast<std::uintptr_t>(begin);
  const std::size_t before = (large - at % large) % large;  // up to the first whole page
  if (bytes < before + large) return;
  const std::size_t whole = (bytes - before) / large * large;
  (void)::madvise(static_cast<char*>(begin) + before, whole, MADV_HUGEPAGE);
#endif
}

}  // namespace base
