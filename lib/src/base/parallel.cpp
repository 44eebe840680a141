#include "brink/base/parallel.hpp"

#include <algorithm>
#include <atomic>
#include <exception>
#include <thread>
#include <vector>

namespace brink {

unsigned thread_count(unsigned requested) {
  return requested > 0 ? requested : std::max(1U, std::thread::hardware_concurrency());
}

void for_each_chunk(std::size_t count, std::size_t chunk_size, unsigned threads,
                    const std::function<void(std::size_t, std::size_t, std::size_t)>& work) {
  const std::size_t chunks = chunk_total(count, chunk_size);
  std::vector<std::exception_ptr> failures(chunks);
  std::atomic<std::size_t> next{0};
  const auto run = [&] {
    for (std::size_t chunk = next++; chunk < chunks; chunk = next++) {
      try {
        work(chunk, chunk * chunk_size, std::min(count, (chunk + 1) * chunk_size));
      } catch (...) {
        failures[chunk] = std::current_exception();
      }
    }
  };
  const std::size_t helpers =
      std::min<std::size_t>(thread_count(threads), std::max<std::size_t>(chunks, 1)) - 1;
  {
    std::vector<std::jthread> pool;
    for (std::size_t i = 0; i < helpers; ++i) pool.emplace_back(run);
    run();
  }
  for (const auto& failure : failures) {
    if (failure) std::rethrow_exception(failure);
  }
}

}  // namespace brink
