// Fewer page faults for arrays of many megabytes.
#pragma once

#include <cstddef>
#include <vector>

namespace brink {

// Tells the system that `bytes` from `begin` on will all be written, so that it may back them by
// large pages: touching a fresh array of 10^6 readings for the first time otherwise costs more than
// reading them. Changes no value; does nothing for less than a few megabytes or where the system
// knows no such advice.
void expect_large(void* begin, std::size_t bytes);

// reserve() with that advice.
template <typename T>
void reserve_large(std::vector<T>& values, std::size_t count) {
  values.reserve(count);
  expect_large(values.data(), values.capacity() * sizeof(T));
}

}  // namespace brink
