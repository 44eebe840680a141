// Runs the cases of tests/cli/*/*.toml on the program itself, each in a folder of its own.
//
// A file holds [[case]] tables:
//   name            of the case; letters, digits and _
//   args            words behind "brink"
//   files           table of file name and text, made before the run
//   hex             table of file name and bytes in hexadecimal, for what is not text
//   repeat          table of file name and [text, times, end]: the text so many times, then the end
//   folders         list of folders made before the run
//   read_only       list of files and folders whose write permission is taken away
//   stdin           text
//   env             list of "NAME=value"
//   status          exit status; 0 where absent
//   stdout, stderr  the whole text expected
//   stdout_has, stderr_has   list of texts that have to stand in it
//   creates         list of files that have to be there afterwards
// Without stderr or stderr_has, nothing may be written to standard error. Without stdout or
// stdout_has, standard output is not looked at where the status is 0, and has to be empty where it
// is not. Any other new file, temporary ones included, fails the case.
#include <gtest/gtest.h>
#include <toml++/toml.h>
#include <unistd.h>

#include <algorithm>
#include <filesystem>
#include <fstream>
#include <optional>
#include <set>
#include <sstream>
#include <string>
#include <vector>

#include "support/run_process.hpp"
#include "support/temporary_folder.hpp"

namespace brink {
namespace {

namespace fs = std::filesystem;

struct Case {
  std::string name;
  std::string source;
  toml::table table;
};

void PrintTo(const Case& shown, std::ostream* out) {
  *out << shown.source;
}

std::vector<std::string> texts(const toml::table& table, std::string_view key) {
  std::vector<std::string> result;
  if (const toml::array* array = table[key].as_array()) {
    for (const toml::node& node : *array) result.push_back(node.value_or(std::string()));
  }
  return result;
}

std::vector<Case> read_cases() {
  std::vector<fs::path> paths;
  for (const auto& entry : fs::recursive_directory_iterator(BRINK_TEST_DIR "/cli")) {
    if (entry.path().extension() == ".toml") paths.push_back(entry.path());
  }
  std::sort(paths.begin(), paths.end());
  std::vector<Case> cases;
  for (const fs::path& path : paths) {
    toml::table file = toml::parse_file(path.string());
    for (toml::node& node : *file["case"].as_array()) {
      const std::string name = node.as_table()->at("name").value_or(std::string());
      const std::string group = path.parent_path().filename().string();
      cases.push_back({group + "_" + path.stem().string() + "_" + name, path.string() + ": " + name,
                       std::move(*node.as_table())});
    }
  }
  return cases;
}

std::string from_hex(const std::string& digits) {
  std::string bytes;
  std::istringstream pairs(digits);
  for (std::string pair; pairs >> pair;) {
    bytes.push_back(static_cast<char>(std::stoi(pair, nullptr, 16)));
  }
  return bytes;
}

template <typename Make>
void write_each(const toml::table& table, std::string_view key, const fs::path& folder,
                const Make& make) {
  const toml::table* files = table[key].as_table();
  if (files == nullptr) return;
  for (const auto& [name, node] : *files) {
    std::ofstream(folder / std::string(name.str()), std::ios::binary) << make(node);
  }
}

void prepare(const toml::table& table, const fs::path& folder) {
  for (const std::string& name : texts(table, "folders")) fs::create_directories(folder / name);
  write_each(table, "files", folder, [](const toml::node& n) { return n.value_or(std::string()); });
  write_each(table, "hex", folder,
             [](const toml::node& n) { return from_hex(n.value_or(std::string())); });
  write_each(table, "repeat", folder, [](const toml::node& node) {
    const toml::array& parts = *node.as_array();
    std::string bytes;
    for (auto i = parts[1].value_or(std::int64_t{0}); i > 0; --i) {
      bytes += parts[0].value_or(std::string());
    }
    return bytes + parts[2].value_or(std::string());
  });
  for (const std::string& name : texts(table, "read_only")) {
    fs::permissions(folder / name,
                    fs::perms::all & ~(fs::perms::owner_write | fs::perms::group_write |
                                       fs::perms::others_write));
  }
}

std::set<std::string> entries(const fs::path& folder) {
  std::set<std::string> names;
  for (const auto& entry : fs::recursive_directory_iterator(folder)) {
    names.insert(fs::relative(entry.path(), folder).string());
  }
  return names;
}

void compare(const toml::table& table, const std::string& key, const std::string& actual,
             bool may_be_anything) {
  const auto whole = table[key].value<std::string>();
  const std::vector<std::string> parts = texts(table, key + "_has");
  if (whole) {
    EXPECT_EQ(actual, *whole) << key;
  }
  for (const std::string& part : parts) {
    EXPECT_NE(actual.find(part), std::string::npos) << key << " lacks: " << part << "\n" << actual;
  }
  if (!whole && parts.empty() && !may_be_anything) {
    EXPECT_EQ(actual, "") << key;
  }
}

class CommandLineCase : public ::testing::TestWithParam<Case> {};

TEST_P(CommandLineCase, EndsAsWritten) {
  const toml::table& table = GetParam().table;
  if (!texts(table, "read_only").empty() && ::geteuid() == 0) {
    GTEST_SKIP() << "root may write anywhere";
  }
  const testing::TemporaryFolder folder;
  const testing::TemporaryFolder scratch;
  prepare(table, folder.path());
  const std::set<std::string> before = entries(folder.path());

  std::vector<std::string> command{BRINK_PROGRAM};
  for (const std::string& word : texts(table, "args")) command.push_back(word);
  const testing::ProcessOutcome outcome =
      testing::run_process(command, folder.path().string(), scratch.path().string(),
                           table["stdin"].value_or(std::string()), texts(table, "env"));

  const int status = table["status"].value_or(0);
  EXPECT_EQ(outcome.status, status) << outcome.err;
  compare(table, "stdout", outcome.out, status == 0);
  compare(table, "stderr", outcome.err, false);
  std::set<std::string> expected = before;
  for (const std::string& name : texts(table, "creates")) expected.insert(name);
  EXPECT_EQ(entries(folder.path()), expected);
}

INSTANTIATE_TEST_SUITE_P(All, CommandLineCase, ::testing::ValuesIn(read_cases()),
                         [](const auto& one) { return one.param.name; });

}  // namespace
}  // namespace brink
