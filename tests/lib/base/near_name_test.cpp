#include "brink/base/near_name.hpp"

#include <gtest/gtest.h>

namespace brink {
namespace {

TEST(NearName, DistanceCountsEditsAndSwaps) {
  EXPECT_EQ(edit_distance("", "abc"), 3U);
  EXPECT_EQ(edit_distance("friction", "frction"), 1U);
  EXPECT_EQ(edit_distance("sets", "stes"), 1U);
  EXPECT_EQ(edit_distance("Dip", "dip"), 0U);
  EXPECT_EQ(edit_distance("kitten", "sitting"), edit_distance("sitting", "kitten"));
}

TEST(NearName, FindsTheNearestOrTheOnlyBeginning) {
  const std::vector<std::string> known{"--face", "--friction", "--strike-tolerance", "--seed"};
  EXPECT_EQ(near_name("--frction", known), "--friction");
  EXPECT_EQ(near_name("--strike", known), "--strike-tolerance");
  EXPECT_EQ(near_name("--s", known), "");  // two begin so
  EXPECT_EQ(near_name("--colour", known), "");
  EXPECT_EQ(near_name("", known), "");
}

TEST(NearName, Question) {
  EXPECT_EQ(did_you_mean("stes", {"sets"}), " (did you mean 'sets'?)");
  EXPECT_EQ(did_you_mean("wedge", {"sets"}), "");
}

}  // namespace
}  // namespace brink
