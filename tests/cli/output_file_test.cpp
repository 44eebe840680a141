#include "output_file.hpp"

#include <gtest/gtest.h>

#include <filesystem>
#include <sstream>

#include "brink/base/error.hpp"
#include "support/temporary_folder.hpp"

namespace brink::cli {
namespace {

using testing::TemporaryFolder;

template <typename Action>
std::string file_error(const Action& action) {
  try {
    action();
  } catch (const Error& error) {
    EXPECT_EQ(error.kind(), ErrorKind::file);
    return error.what();
  }
  return "no error";
}

TEST(OutputFile, WritesWholeFilesAndLeavesNothingElse) {
  const TemporaryFolder folder;
  write_file(folder.file("a.csv"), "one");
  write_file(folder.file("a.csv"), "two\n");
  EXPECT_EQ(folder.read("a.csv"), "two\n");
  EXPECT_EQ(folder.entries(), 1U);
}

TEST(OutputFile, KeepsTheLinkAndItsTarget) {
  const TemporaryFolder folder;
  folder.write("real.csv", "old");
  std::filesystem::create_symlink(folder.file("real.csv"), folder.file("link.csv"));
  write_file(folder.file("link.csv"), "new");
  EXPECT_TRUE(std::filesystem::is_symlink(folder.file("link.csv")));
  EXPECT_EQ(folder.read("real.csv"), "new");
}

TEST(OutputFile, RefusesFoldersMissingFoldersAndInputs) {
  const TemporaryFolder folder;
  const std::string input = folder.write("in.csv", "data");
  EXPECT_NE(file_error([&] { write_file(folder.path().string(), "x"); }).find("is a folder"),
            std::string::npos);
  EXPECT_NE(file_error([&] { write_file(folder.file("no/a.csv"), "x"); }).find("no folder"),
            std::string::npos);
  EXPECT_NE(file_error([&] {
              write_file(folder.file("../" + folder.path().filename().string() + "/in.csv"), "x",
                         {"-", input});
            }).find("not overwritten"),
            std::string::npos);
  EXPECT_EQ(folder.read("in.csv"), "data");
  EXPECT_EQ(folder.entries(), 1U);
}

TEST(OutputFile, AFullDiskIsAnError) {
  if (!std::filesystem::exists("/dev/full")) GTEST_SKIP() << "no /dev/full here";
  EXPECT_NE(file_error([] { write_file("/dev/full", "x"); }).find("No space left"),
            std::string::npos);
}

TEST(OutputFile, DashIsStandardOutput) {
  std::ostringstream out;
  write_output("-", "bytes", out);
  EXPECT_EQ(out.str(), "bytes");
}

TEST(OutputFile, FoldersAreMadeAndFilledWhole) {
  const TemporaryFolder folder;
  write_folder(folder.file("a/b/"), {{"one.csv", "1"}, {"two.csv", "2"}});
  write_folder(folder.file("a/b"), {{"two.csv", "3"}});
  EXPECT_EQ(folder.read("a/b/one.csv"), "1");
  EXPECT_EQ(folder.read("a/b/two.csv"), "3");
  folder.write("plain", "x");
  EXPECT_NE(file_error([&] {
              write_folder(folder.file("plain"), {{"a", "1"}});
            }).find("is a file"),
            std::string::npos);
  EXPECT_EQ(folder.entries(), 2U);
}

TEST(OutputFile, KnownEndingsInAnyCase) {
  EXPECT_EQ(known_ending("-o", "net.SVG", {".svg", ".pdf"}), ".svg");
  try {
    known_ending("-o", "net.jpg", {".svg", ".pdf"});
    FAIL();
  } catch (const Error& error) {
    EXPECT_STREQ(error.what(),
                 "-o: 'net.jpg' has no known ending; accepted: a name ending in .svg, .pdf");
    EXPECT_EQ(error.kind(), ErrorKind::argument);
  }
}

}  // namespace
}  // namespace brink::cli
