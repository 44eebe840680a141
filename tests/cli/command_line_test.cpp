#include "command_line.hpp"

#include <gtest/gtest.h>

#include <memory>
#include <ostream>

#include "brink/base/error.hpp"
#include "options.hpp"
#include "support/run_brink.hpp"

namespace brink::cli {
namespace {

struct DigState {
  std::vector<Face> faces;
  double force_kN = 0.0;
  OutputOptions output;
};

// A command of the test's own, which prints what it was given.
Command dig_command() {
  const auto state = std::make_shared<DigState>();
  Command command;
  command.name = "dig";
  command.summary = "Digs.";
  command.positionals = Positionals::files;
  Option face;
  face.name = "--face";
  face.value = "DIP/DIR";
  face.help = "Face.";
  face.repeatable = true;
  face.take = [state](std::string_view text) {
    state->faces.push_back(parse_face("--face", text));
  };
  Option force = number_option("--force", "KN", "Force in kN.", any_number("kN"), state->force_kN);
  force.required = true;
  force.default_text = "none";
  command.options = {face, force, output_option("OUT.csv", "Table.", state->output)};
  add_output_options(command.options, state->output);
  command.examples = {{"brink dig a.csv --force 5", "Digs a."}};
  command.run = [state](const std::vector<std::string>& operands, Streams& streams) {
    streams.out << state->faces.size() << " faces, " << state->force_kN << " kN, "
                << (state->output.quiet ? "quiet" : "loud") << ", to " << state->output.output;
    for (const std::string& operand : operands) streams.out << " [" << operand << "]";
    if (!operands.empty() && operands[0] == "bad.csv") {
      throw Error(ErrorKind::input, Place{"bad.csv", 7, 1, "dip"}, "is above 90", "120",
                  "0 to 90 degrees");
    }
    if (!operands.empty() && operands[0] == "gone.csv") {
      throw Error(ErrorKind::file, Place{"gone.csv"}, "cannot be read: no such file");
    }
    return 0;
  };
  return command;
}

Command fill_command() {
  Command command;
  command.name = "fill";
  command.summary = "Fills.";
  command.run = [](const std::vector<std::string>&, Streams&) { return 0; };
  return command;
}

testing::Outcome run(const std::vector<std::string>& arguments) {
  return testing::run_brink(arguments, {dig_command(), fill_command()});
}

TEST(CommandLine, TakesOptionsAndFilesInAnyOrder) {
  EXPECT_EQ(run({"dig", "--face", "65/120", "a.csv", "--force", "-12.5", "b.csv"}).out,
            "1 faces, -12.5 kN, loud, to  [a.csv] [b.csv]");
  EXPECT_EQ(run({"dig", "--force=1", "--quiet", "-", "-o", "x", "--face=1/2", "--face", "3/4"}).out,
            "2 faces, 1 kN, quiet, to x [-]");
}

TEST(CommandLine, WordsBehindTwoDashesAreFiles) {
  EXPECT_EQ(run({"dig", "--force", "1", "--", "--quiet", "-x.csv", "dig"}).out,
            "0 faces, 1 kN, loud, to  [--quiet] [-x.csv] [dig]");
}

TEST(CommandLine, FilesMayLookLikeCommandsAndLists) {
  EXPECT_EQ(run({"dig", "fill", "[a,b]", "--force", "1", "a b"}).out,
            "0 faces, 1 kN, loud, to  [fill] [[a,b]] [a b]");
}

struct Refusal {
  std::vector<std::string> arguments;
  std::string message;
};

TEST(CommandLine, RefusesWithStatus2AndSaysWhy) {
  const std::string dig_hint = "\nSee 'brink dig --help'.\n";
  const std::string hint = "\nSee 'brink --help'.\n";
  const std::vector<Refusal> refusals{
      {{"dgi"}, "error: 'dgi' is not a command (did you mean 'dig'?); accepted: dig, fill" + hint},
      {{"--quiet", "dig"},
       "error: '--quiet' stands before the command; accepted: brink COMMAND [options]" + hint},
      {{"dig", "--forse", "3"},
       "error: '--forse' is not an option of brink dig (did you mean '--force'?)" + dig_hint},
      {{"dig", "--colour"}, "error: '--colour' is not an option of brink dig" + dig_hint},
      {{"dig", "--force"}, "error: --force: needs a value; accepted: KN" + dig_hint},
      {{"dig", "--force=", "a.csv"}, "error: --force: needs a value; accepted: KN" + dig_hint},
      {{"dig", "--force", "--quiet"}, "error: --force: needs a value; accepted: KN" + dig_hint},
      {{"dig", "--force", "1", "--force", "2"},
       "error: --force: '2' is given twice, the second time here; accepted: one KN" + dig_hint},
      {{"dig", "--quiet=yes", "--force", "1"},
       "error: --quiet: 'yes' is too much: it takes no value" + dig_hint},
      {{"dig", "--force", "--", "a.csv"}, "error: --force: needs a value; accepted: KN" + dig_hint},
      {{"dig", "--force", "1", "-12"}, "error: '-12' is not an option of brink dig" + dig_hint},
      {{"dig", "a.csv"}, "error: --force: is missing; accepted: --force KN" + dig_hint},
      {{"dig", "--force", "nan"},
       "error: --force: 'nan' is not a number; accepted: a number of kN" + dig_hint},
      {{"dig", "--face", "0/120"},
       "error: --face: '0/120' has a dip of 0; accepted: a dip of above 0 and below 180 degrees" +
           dig_hint},
      {{"fill", "a.csv"},
       "error: 'a.csv' is too much: brink fill reads no file; accepted: options only\n"
       "See 'brink fill --help'.\n"}};
  for (const Refusal& refusal : refusals) {
    const testing::Outcome outcome = run(refusal.arguments);
    EXPECT_EQ(outcome.status, 2) << refusal.message;
    EXPECT_EQ(outcome.err, refusal.message);
    EXPECT_EQ(outcome.out, "");
  }
}

TEST(CommandLine, NoCommandPrintsTheHelpAsAnError) {
  const testing::Outcome outcome = run({});
  EXPECT_EQ(outcome.status, 2);
  EXPECT_NE(outcome.err.find("Usage: brink COMMAND"), std::string::npos);
}

TEST(CommandLine, ErrorsOfTheRunBecomeExitStatuses) {
  const testing::Outcome bad = run({"dig", "bad.csv", "--force", "1"});
  EXPECT_EQ(bad.status, 1);
  EXPECT_EQ(bad.err, "error: bad.csv:7:1: dip: '120' is above 90; accepted: 0 to 90 degrees\n");
  const testing::Outcome gone = run({"dig", "gone.csv", "--force", "1"});
  EXPECT_EQ(gone.status, 3);
  EXPECT_EQ(gone.err, "error: gone.csv: cannot be read: no such file\n");
}

TEST(CommandLine, HelpWinsOverWrongOptionsAndShowsUnitsDefaultsExamples) {
  const testing::Outcome outcome = run({"dig", "--colour", "--help"});
  EXPECT_EQ(outcome.status, 0);
  for (const char* part : {"Usage: brink dig FILE... --force KN [options]", "--face DIP/DIR",
                           "May repeat.", "Required.", "Default: none.", "-o, --output OUT.csv",
                           "brink dig a.csv --force 5", "Exit status"}) {
    EXPECT_NE(outcome.out.find(part), std::string::npos) << part << "\n" << outcome.out;
  }
}

TEST(CommandLine, VersionAndProgramHelp) {
  EXPECT_TRUE(run({"--version"}).out.starts_with("brink "));
  EXPECT_NE(run({"--help"}).out.find("  dig"), std::string::npos);
}

TEST(CommandLine, StandardOutputThatFailsIsStatus3) {
  std::istringstream in;
  std::ostringstream out;
  std::ostringstream err;
  Streams streams{in, out, err};
  out.setstate(std::ios::badbit);
  EXPECT_EQ(run_program({"--version"}, {}, streams), 3);
  EXPECT_EQ(err.str(), "error: standard output could not be written\n");
}

}  // namespace
}  // namespace brink::cli
