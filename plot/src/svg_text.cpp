#include "svg_text.hpp"

#include <fmt/format.h>

#include <map>

namespace brink::plot {

namespace {

// The name that starts at `from`, up to the character that ends it in an attribute.
std::string_view name_at(std::string_view svg, std::size_t from) {
  return svg.substr(from, svg.find_first_of("\")", from) - from);
}

std::map<std::string, std::string, std::less<>> new_names(std::string_view svg,
                                                          std::string_view prefix) {
  constexpr std::string_view kAttribute = " id=\"";
  std::map<std::string, std::string, std::less<>> names;
  for (std::size_t at = svg.find(kAttribute); at != std::string_view::npos;
       at = svg.find(kAttribute, at + 1)) {
    const std::string_view name = name_at(svg, at + kAttribute.size());
    names.try_emplace(std::string(name), fmt::format("{}-{}", prefix, names.size() + 1));
  }
  return names;
}

}  // namespace

std::string xml_escaped(std::string_view text) {
  std::string out;
  for (const char c : text) {
    switch (c) {
      case '&':
        out += "&amp;";
        break;
      case '<':
        out += "&lt;";
        break;
      case '>':
        out += "&gt;";
        break;
      case '"':
        out += "&quot;";
        break;
      case '\'':
        out += "&#39;";
        break;
      default:
        if (static_cast<unsigned char>(c) >= 0x20) out += c;
    }
  }
  return out;
}

std::string with_own_ids(std::string_view svg, std::string_view prefix) {
  const auto names = new_names(svg, prefix);
  std::string out;
  std::size_t copied = 0;
  const auto rename_at = [&](std::size_t from) {
    const auto found = names.find(name_at(svg, from));
    if (found == names.end()) return;
    out += svg.substr(copied, from - copied);
    out += found->second;
    copied = from + found->first.size();
  };
  for (std::size_t at = 0; at < svg.size(); ++at) {
    const std::string_view rest = svg.substr(at);
    if (rest.starts_with(" id=\"")) rename_at(at + 5);
    if (rest.starts_with("=\"#")) rename_at(at + 3);
    if (rest.starts_with("url(#")) rename_at(at + 5);
  }
  out += svg.substr(copied);
  return out;
}

std::string with_words(std::string_view svg, std::string_view prefix, std::string_view title,
                       std::string_view description, const std::vector<PaintedLine>& lines) {
  const std::size_t tag = svg.find("<svg");
  const std::size_t body = svg.find('>', tag);
  const std::size_t end = svg.rfind("</svg>");
  std::string out(svg.substr(0, body));
  out += fmt::format(" role=\"img\" aria-labelledby=\"{0}-title\" aria-describedby=\"{0}-desc\">\n",
                     prefix);
  out += fmt::format("<title id=\"{0}-title\">{1}</title>\n<desc id=\"{0}-desc\">{2}</desc>",
                     prefix, xml_escaped(title), xml_escaped(description));
  out += svg.substr(body + 1, end - body - 1);
  out += "<g fill-opacity=\"0\" font-family=\"sans-serif\">\n";
  for (const PaintedLine& line : lines) {
    out += fmt::format(
        "<text x=\"{:.3f}\" y=\"{:.3f}\" font-size=\"{:.3f}\" textLength=\"{:.3f}\">{}</text>\n",
        line.x_mm, line.baseline_mm, line.size_mm, line.width_mm, xml_escaped(line.text));
  }
  out += "</g>\n</svg>\n";
  return out;
}

}  // namespace brink::plot
