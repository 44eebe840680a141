// Help and examples: every command has a help page, and every example on it runs as typed.
#include <gtest/gtest.h>

#include <filesystem>
#include <sstream>

#include "support/run_brink.hpp"
#include "support/run_process.hpp"
#include "support/temporary_folder.hpp"

namespace brink {
namespace {

std::vector<std::string> words_of(const std::string& command) {
  std::istringstream in(command);
  std::vector<std::string> words;
  for (std::string word; in >> word;) words.push_back(word);
  return words;
}

TEST(Examples, EveryCommandHasAHelpPageWithUnitsAndExamples) {
  for (const cli::Command& command : cli::all_commands()) {
    const testing::Outcome help = testing::run_brink({command.name, "--help"});
    EXPECT_EQ(help.status, 0);
    EXPECT_EQ(help.err, "");
    EXPECT_NE(help.out.find("Usage: brink " + command.name), std::string::npos);
    EXPECT_FALSE(command.examples.empty()) << command.name;
    for (const cli::Option& option : command.options) {
      EXPECT_NE(help.out.find(option.name), std::string::npos) << option.name;
      EXPECT_FALSE(option.help.empty()) << option.name;
    }
  }
}

TEST(Examples, EveryExampleRunsFromTheSampleFolder) {
  const testing::TemporaryFolder folder;
  const testing::TemporaryFolder scratch;
  std::filesystem::copy(BRINK_SAMPLE_DIR, folder.path(), std::filesystem::copy_options::recursive);
  for (const cli::Command& command : cli::all_commands()) {
    for (const cli::Example& example : command.examples) {
      std::vector<std::string> words = words_of(example.command);
      ASSERT_EQ(words.at(0), "brink") << example.command;
      words[0] = BRINK_PROGRAM;
      const testing::ProcessOutcome outcome =
          testing::run_process(words, folder.path().string(), scratch.path().string());
      EXPECT_EQ(outcome.status, 0) << example.command << "\n" << outcome.err;
      EXPECT_EQ(outcome.err.find("error"), std::string::npos) << outcome.err;
    }
  }
}

}  // namespace
}  // namespace brink
