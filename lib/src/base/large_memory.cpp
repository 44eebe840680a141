#include "brink/base/large_memory.hpp"

#ifdef __linux__
#include <sys/mman.h>

#include <cstdint>
#endif

namespace brink {

#ifdef __linux__

void expect_large(void* begin, std::size_t bytes) {
  constexpr std::uintptr_t kPage = 4096;
  constexpr std::size_t kWorthwhile = std::size_t{4} << 20;
  if (bytes < kWorthwhile) return;
  // Whole pages inside the array. Neighbouring arrays that are both advised on share the large
  // pages between them.
  const auto first = reinterpret_cast<std::uintptr_t>(begin);
  const std::uintptr_t from = (first + kPage - 1) / kPage * kPage;
  const std::uintptr_t to = (first + bytes) / kPage * kPage;
  // Advice that isn't taken, on a machine with other pages say, is no error.
  (void)madvise(reinterpret_cast<void*>(from), to - from, MADV_HUGEPAGE);
}

#else

void expect_large(void*, std::size_t) {}

#endif

}  // namespace brink
