#include "brink/base/near_name.hpp"

#include <algorithm>

namespace brink {

namespace {

char lower(char c) {
  return c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c;
}

std::string lower_case(std::string_view text) {
  std::string result(text);
  std::transform(result.begin(), result.end(), result.begin(), lower);
  return result;
}

std::string only_name_beginning_with(std::string_view word, const std::vector<std::string>& known) {
  std::string found;
  for (const std::string& name : known) {
    if (!lower_case(name).starts_with(lower_case(word))) continue;
    if (!found.empty()) return {};
    found = name;
  }
  return found;
}

}  // namespace

std::size_t edit_distance(std::string_view a, std::string_view b) {
  const std::string s = lower_case(a);
  const std::string t = lower_case(b);
  std::vector<std::size_t> before_last(t.size() + 1);
  std::vector<std::size_t> last(t.size() + 1);
  std::vector<std::size_t> row(t.size() + 1);
  for (std::size_t j = 0; j <= t.size(); ++j) last[j] = j;
  for (std::size_t i = 1; i <= s.size(); ++i) {
    row[0] = i;
    for (std::size_t j = 1; j <= t.size(); ++j) {
      const std::size_t substitution = last[j - 1] + (s[i - 1] == t[j - 1] ? 0 : 1);
      row[j] = std::min({last[j] + 1, row[j - 1] + 1, substitution});
      if (i > 1 && j > 1 && s[i - 1] == t[j - 2] && s[i - 2] == t[j - 1]) {
        row[j] = std::min(row[j], before_last[j - 2] + 1);
      }
    }
    before_last.swap(last);
    last.swap(row);
  }
  return last[t.size()];
}

std::string near_name(std::string_view word, const std::vector<std::string>& known) {
  constexpr std::size_t longest_word = 64;  // nobody mistypes a name into more
  if (word.empty() || word.size() > longest_word) return {};
  std::string nearest;
  std::size_t least = std::max<std::size_t>(1, word.size() / 3) + 1;
  for (const std::string& name : known) {
    const std::size_t distance = edit_distance(word, name);
    if (distance < least) {
      least = distance;
      nearest = name;
    }
  }
  return nearest.empty() ? only_name_beginning_with(word, known) : nearest;
}

std::string did_you_mean(std::string_view word, const std::vector<std::string>& known) {
  const std::string name = near_name(word, known);
  return name.empty() ? name : " (did you mean '" + name + "'?)";
}

}  // namespace brink
