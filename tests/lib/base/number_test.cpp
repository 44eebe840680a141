#include "brink/base/number.hpp"

#include <gtest/gtest.h>

#include <bit>
#include <charconv>
#include <cmath>
#include <cstdint>
#include <string>

#include "brink/base/random.hpp"

namespace brink {
namespace {

// The standard library's reader, which rounds correctly: the reference for the fast way.
double from_chars_of(const std::string& text) {
  double value = 0.0;
  std::from_chars(text.data(), text.data() + text.size(), value);
  return value;
}

std::string random_decimal(std::uint64_t seed, std::uint64_t digits, std::uint64_t point) {
  std::string text = random_index(seed, 9, 0, 4) == 0 ? "-" : "";
  for (std::uint64_t i = 0; i < digits; ++i) {
    if (i == point) text += '.';
    text += static_cast<char>('0' + random_index(seed, 1, i, 10));
  }
  return text;
}

TEST(Number, DecimalsHaveTheBitsOfFromChars) {
  std::uint64_t seed = 0;
  for (std::uint64_t digits = 1; digits <= 20; ++digits) {
    for (std::uint64_t point = 0; point <= digits; ++point) {
      for (int repeat = 0; repeat < 40; ++repeat) {
        const std::string text = random_decimal(++seed, digits, point);
        const auto value = parse_decimal(text);
        ASSERT_TRUE(value) << text;
        EXPECT_EQ(std::bit_cast<std::uint64_t>(*value),
                  std::bit_cast<std::uint64_t>(from_chars_of(text)))
            << text;
      }
    }
  }
}

TEST(Number, EveryTenthOfADegreeIsTheNearestDouble) {
  for (int tenths = 0; tenths <= 3600; ++tenths) {
    const std::string text = std::to_string(tenths / 10) + "." + std::to_string(tenths % 10);
    EXPECT_EQ(parse_decimal(text), from_chars_of(text)) << text;
  }
}

TEST(Number, WhatIsNoFiniteDecimalIsRefused) {
  for (const char* text :
       {"",    " ",   "-",   "+",    ".",     "-.",  "1 ", " 1", "1.2.3", "1-2",     "--1",
        "+-1", "nan", "inf", "0x10", "1e999", "1,5", "1e", "e5", "12a",   "\xC2\xB0"}) {
    EXPECT_FALSE(parse_decimal(text)) << text;
  }
  EXPECT_EQ(parse_decimal("+1.5"), 1.5);
  EXPECT_EQ(parse_decimal("1e2"), 100.0);
  EXPECT_EQ(parse_decimal("5."), 5.0);
  EXPECT_EQ(parse_decimal(".5"), 0.5);
  EXPECT_TRUE(std::signbit(*parse_decimal("-0")));
}

TEST(Number, ShortestComesBackAndFixedHasNoMinusZero) {
  for (std::uint64_t i = 0; i < 2000; ++i) {
    const double value =
        (random_uniform(5, 0, i) - 0.5) * std::pow(10.0, static_cast<double>(i % 30) - 15.0);
    EXPECT_EQ(parse_decimal(shortest(value)), value);
  }
  EXPECT_EQ(shortest(-0.0), "0");
  EXPECT_EQ(fixed(-0.004, 2), "0.00");
  EXPECT_EQ(fixed(-0.006, 2), "-0.01");
}

}  // namespace
}  // namespace brink
