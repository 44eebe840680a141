#include "site_table.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "brink/base/near_name.hpp"

namespace brink {

namespace {

const TomlTable kNoTable;

std::string joined(const std::vector<std::string>& names) {
  return fmt::format("{}", fmt::join(names, ", "));
}

}  // namespace

SiteTable::SiteTable(const TomlTable& table, std::string file, std::string name, std::size_t line,
                     const std::vector<std::string>& known)
    : table_(&table), file_(std::move(file)), name_(std::move(name)), line_(line) {
  const std::pair<std::string, TomlValue>* first = nullptr;
  for (const auto& member : table.members) {
    if (std::find(known.begin(), known.end(), member.first) != known.end()) continue;
    if (first == nullptr || member.second.key_line < first->second.key_line) first = &member;
  }
  if (first == nullptr) return;
  const std::string where = name_.empty() ? "the site file" : fmt::format("[{}]", name_);
  throw Error(ErrorKind::input, Place{file_, first->second.key_line, first->second.key_column, {}},
              fmt::format("is not a key of {}{}", where, did_you_mean(first->first, known)),
              first->first, joined(known));
}

std::string SiteTable::full_key(const std::string& key) const {
  return name_.empty() ? key : name_ + "." + key;
}

Error SiteTable::wrong(const std::string& key, std::string_view what,
                       std::string_view accepted) const {
  const TomlValue& at = value(key);
  return Error(ErrorKind::input, Place{file_, at.line, at.column, full_key(key)}, what, at.text,
               accepted);
}

Error SiteTable::missing(const std::string& key, std::string_view accepted) const {
  return Error(ErrorKind::input, Place{file_, line_, 0, full_key(key)}, "is missing", {}, accepted);
}

std::optional<double> SiteTable::number(const std::string& key, const Interval& accepted) const {
  if (!has(key)) return {};
  const double* found = std::get_if<double>(&value(key).content);
  if (found == nullptr || !std::isfinite(*found)) {
    throw wrong(key, "is not a number", accepted.text());
  }
  if (!accepted.contains(*found)) throw wrong(key, "is out of range", accepted.text());
  return *found + 0.0;  // no negative zero
}

double SiteTable::required_number(const std::string& key, const Interval& accepted) const {
  if (!has(key)) throw missing(key, accepted.text());
  return *number(key, accepted);
}

std::optional<Angle> SiteTable::angle(const std::string& key, const Interval& accepted) const {
  const std::optional<double> degrees = number(key, accepted);
  if (!degrees) return {};
  return Angle::degrees(*degrees);
}

std::optional<std::size_t> SiteTable::whole(const std::string& key, std::size_t low,
                                            std::size_t high) const {
  if (!has(key)) return {};
  const std::string accepted = fmt::format("a whole number, {} to {}", low, high);
  const double* found = std::get_if<double>(&value(key).content);
  if (found == nullptr || !value(key).whole) throw wrong(key, "is not a whole number", accepted);
  if (*found < static_cast<double>(low) || *found > static_cast<double>(high)) {
    throw wrong(key, "is out of range", accepted);
  }
  return static_cast<std::size_t>(*found);
}

std::optional<std::string> SiteTable::text(const std::string& key) const {
  if (!has(key)) return {};
  const std::string* found = std::get_if<std::string>(&value(key).content);
  if (found == nullptr) throw wrong(key, "is not a text", "a text in quotes");
  if (found->find_first_not_of(" \t\r\n") == std::string::npos) {
    throw wrong(key, "is blank", "a text in quotes");
  }
  return *found;
}

std::string SiteTable::required_text(const std::string& key) const {
  if (!has(key)) throw missing(key, "a text in quotes");
  return *text(key);
}

std::vector<std::string> SiteTable::texts(const std::string& key) const {
  if (!has(key)) return {};
  constexpr auto accepted = "a list of texts, as in [\"bench=2\"]";
  const TomlArray* found = std::get_if<TomlArray>(&value(key).content);
  if (found == nullptr) throw wrong(key, "is not a list", accepted);
  std::vector<std::string> result;
  for (const TomlValue& item : *found) {
    const std::string* text = std::get_if<std::string>(&item.content);
    if (text == nullptr) throw wrong(key, "holds something else than texts", accepted);
    result.push_back(*text);
  }
  return result;
}

std::vector<SiteTable> SiteTable::tables(const std::string& key,
                                         const std::vector<std::string>& known) const {
  if (!has(key)) return {};
  const std::string accepted = fmt::format("[[{}]] tables", key);
  const TomlArray* found = std::get_if<TomlArray>(&value(key).content);
  if (found == nullptr) throw wrong(key, "is not a list of tables", accepted);
  std::vector<SiteTable> result;
  for (const TomlValue& item : *found) {
    const TomlTable* table = std::get_if<TomlTable>(&item.content);
    if (table == nullptr) throw wrong(key, "holds something else than tables", accepted);
    result.emplace_back(*table, file_, key, item.line, known);
  }
  return result;
}

SiteTable SiteTable::table(const std::string& key, const std::vector<std::string>& known) const {
  if (!has(key)) return SiteTable(kNoTable, file_, key, line_, known);
  const TomlTable* found = std::get_if<TomlTable>(&value(key).content);
  if (found == nullptr) throw wrong(key, "is not a table", fmt::format("a table [{}]", key));
  return SiteTable(*found, file_, key, value(key).line, known);
}

}  // namespace brink
