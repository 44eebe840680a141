// Warnings of one kind, the first of them word for word and the rest as a number.
#pragma once

#include <cstddef>
#include <map>
#include <string>
#include <string_view>
#include <vector>

namespace brink {

class CappedWarnings {
 public:
  // `kind` groups warnings; `text` is one of them.
  void add(const std::string& kind, std::string text) {
    if (++count_[kind] <= kMost) texts_.push_back(std::move(text));
  }
  // All texts in the order in which they came, then one line for each kind that was cut short:
  // "pit.ags: 12 more lines that ...".
  std::vector<std::string> list(const std::string& file) const {
    std::vector<std::string> texts = texts_;
    for (const auto& [kind, count] : count_) {
      if (count <= kMost) continue;
      texts.push_back(file + ": " + std::to_string(count - kMost) + " more: " + kind);
    }
    return texts;
  }

 private:
  static constexpr std::size_t kMost = 20;
  std::map<std::string, std::size_t> count_;
  std::vector<std::string> texts_;
};

}  // namespace brink
