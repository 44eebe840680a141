// Help and examples: every command has a help page, and every example on it runs as typed.
#include <gtest/gtest.h>

#include <filesystem>

#include "support/run_brink.hpp"
#include "support/run_process.hpp"
#include "support/temporary_folder.hpp"

namespace brink {
namespace {

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
  const std::string path =
      std::filesystem::path(BRINK_PROGRAM).parent_path().string() + ":/usr/bin:/bin";
  for (const cli::Command& command : cli::all_commands()) {
    for (const cli::Example& example : command.examples) {
      // By the shell, as a reader would: examples may quote.
      const testing::ProcessOutcome outcome =
          testing::run_process({"/bin/sh", "-c", example.command}, folder.path().string(),
                               scratch.path().string(), {}, {"PATH=" + path});
      EXPECT_EQ(outcome.status, 0) << example.command << "\n" << outcome.err;
      EXPECT_EQ(outcome.err.find("error"), std::string::npos) << outcome.err;
    }
  }
}

}  // namespace
}  // namespace brink
