// A TOML file as a plain tree in which every value knows its line and column. Only toml_tree.cpp
// knows the TOML library.
#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <utility>
#include <variant>
#include <vector>

namespace brink {

struct TomlValue;
using TomlArray = std::vector<TomlValue>;

struct TomlTable {
  std::vector<std::pair<std::string, TomlValue>> members;  // sorted by key
  const TomlValue* find(std::string_view key) const;
};

// A date or a time.
struct TomlOther {
  std::string type;
};

struct TomlValue {
  std::variant<bool, double, std::string, TomlArray, TomlTable, TomlOther> content;
  bool whole = false;  // a number written without a point
  std::size_t line = 0;
  std::size_t column = 0;
  std::size_t key_line = 0;  // of the key in front of it; as line where it has none
  std::size_t key_column = 0;
  std::string text;  // the value as it would be typed, for messages; cut where long
};

// Throws ErrorKind::input with the place of the first thing that is not TOML.
TomlTable parse_toml(std::string_view text, const std::string& file);

}  // namespace brink
