#include "lines_in_words.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <map>

namespace brink {

std::string lines_in_words(const Readings& readings, const std::vector<std::size_t>& which) {
  constexpr std::size_t most = 8;
  std::map<std::size_t, std::vector<std::size_t>> by_file;
  for (const std::size_t i : which) {
    by_file[readings.places[i].file].push_back(readings.places[i].line);
  }
  std::string text;
  for (const auto& [file, lines] : by_file) {
    text += fmt::format("{}{}: line{} ", text.empty() ? "" : "; ", readings.files[file].name,
                        lines.size() == 1 ? "" : "s");
    const std::size_t shown = std::min(lines.size(), most);
    for (std::size_t k = 0; k < shown; ++k) text += fmt::format("{}{}", k ? ", " : "", lines[k]);
    if (shown < lines.size()) text += fmt::format(" and {} more", lines.size() - shown);
  }
  return text;
}

}  // namespace brink
