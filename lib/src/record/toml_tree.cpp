#include "toml_tree.hpp"

#include <toml++/toml.h>

#include <sstream>

#include "brink/base/error.hpp"

namespace brink {

namespace {

TomlValue convert(const toml::node& node);

TomlTable convert_table(const toml::table& table) {
  TomlTable result;
  for (const auto& [key, node] : table) {
    TomlValue value = convert(node);
    value.key_line = key.source().begin.line;
    value.key_column = key.source().begin.column;
    result.members.emplace_back(std::string(key.str()), std::move(value));
  }
  return result;
}

TomlArray convert_array(const toml::array& array) {
  TomlArray result;
  for (const toml::node& node : array) result.push_back(convert(node));
  return result;
}

std::string typed(const toml::node& node) {
  std::ostringstream text;
  node.visit([&text](const auto& value) { text << value; });
  return printable(text.str());
}

TomlValue convert(const toml::node& node) {
  TomlValue value;
  value.line = value.key_line = node.source().begin.line;
  value.column = value.key_column = node.source().begin.column;
  value.text = node.is_table() || node.is_array() ? "" : typed(node);
  if (const auto* table = node.as_table()) {
    value.content = convert_table(*table);
  } else if (const auto* array = node.as_array()) {
    value.content = convert_array(*array);
  } else if (const auto* text = node.as_string()) {
    value.content = text->get();
    value.text = printable(text->get());
  } else if (const auto* flag = node.as_boolean()) {
    value.content = flag->get();
  } else if (node.is_number()) {
    value.content = *node.value<double>();
    value.whole = node.is_integer();
  } else {
    value.content = TomlOther{node.is_time() ? "time" : "date"};
  }
  return value;
}

}  // namespace

const TomlValue* TomlTable::find(std::string_view key) const {
  for (const auto& [name, value] : members) {
    if (name == key) return &value;
  }
  return nullptr;
}

TomlTable parse_toml(std::string_view text, const std::string& file) {
  try {
    return convert_table(toml::parse(text, std::string_view(file)));
  } catch (const toml::parse_error& error) {
    const toml::source_position at = error.source().begin;
    throw Error(ErrorKind::input, Place{file, at.line, at.column, {}},
                "this is not TOML: " + std::string(error.description()));
  }
}

}  // namespace brink
