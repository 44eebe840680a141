// Reading one table of a site file: each key once, with its type and range.
#pragma once

#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "brink/base/angle.hpp"
#include "brink/base/error.hpp"
#include "brink/base/interval.hpp"
#include "toml_tree.hpp"

namespace brink {

class SiteTable {
 public:
  // `name` is the table's ("face"), empty for the file itself. Any key not in `known` is refused at
  // once, so that a mistyped key is not reported as a missing one.
  SiteTable(const TomlTable& table, std::string file, std::string name, std::size_t line,
            const std::vector<std::string>& known);

  std::optional<double> number(const std::string& key, const Interval& accepted) const;
  double required_number(const std::string& key, const Interval& accepted) const;
  std::optional<Angle> angle(const std::string& key, const Interval& accepted) const;
  std::optional<std::size_t> whole(const std::string& key, std::size_t low, std::size_t high) const;
  std::optional<std::string> text(const std::string& key) const;  // not blank
  std::string required_text(const std::string& key) const;
  std::vector<std::string> texts(const std::string& key) const;  // empty where absent

  // Members of an array of tables ([[key]]), or nothing.
  std::vector<SiteTable> tables(const std::string& key,
                                const std::vector<std::string>& known) const;
  // A table ([key]); an empty one where absent.
  SiteTable table(const std::string& key, const std::vector<std::string>& known) const;

  bool has(const std::string& key) const { return table_->find(key) != nullptr; }
  std::size_t line() const { return line_; }
  // An error at the value of `key`.
  Error wrong(const std::string& key, std::string_view what, std::string_view accepted = {}) const;
  // An error at the table itself, which lacks `key`.
  Error missing(const std::string& key, std::string_view accepted) const;

 private:
  std::string full_key(const std::string& key) const;
  const TomlValue& value(const std::string& key) const { return *table_->find(key); }

  const TomlTable* table_;
  std::string file_;
  std::string name_;
  std::size_t line_;
};

}  // namespace brink
