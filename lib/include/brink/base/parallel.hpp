// Work in fixed chunks on several threads. Chunk borders depend on the size of the work alone, and
// callers reduce chunk results in index order, so results are the same bits for any number of
// threads.
#pragma once

#include <cstddef>
#include <functional>

namespace brink {

// The number of threads to use for a request: `requested`, or the machine's cores where that is 0.
// At least 1.
unsigned thread_count(unsigned requested);

// Calls work(chunk, begin, end) once for each chunk of `chunk_size` indices of 0 .. count-1, on up
// to `threads` threads (0: all cores). Returns when all is done. The first exception by chunk index
// is rethrown.
void for_each_chunk(
    std::size_t count, std::size_t chunk_size, unsigned threads,
    const std::function<void(std::size_t chunk, std::size_t begin, std::size_t end)>& work);

// Number of chunks that for_each_chunk makes.
constexpr std::size_t chunk_total(std::size_t count, std::size_t chunk_size) {
  return (count + chunk_size - 1) / chunk_size;
}

}  // namespace brink
