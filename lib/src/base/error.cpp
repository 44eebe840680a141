#include "brink/base/error.hpp"

#include <fmt/format.h>

namespace brink {

namespace {

// Length of the well-formed UTF-8 sequence at the start of `text`, 0 where there is none.
std::size_t utf8_length(std::string_view text) {
  const auto byte = [&](std::size_t i) { return static_cast<unsigned char>(text[i]); };
  const unsigned char lead = byte(0);
  if (lead < 0x80) return 1;
  const std::size_t length = lead >= 0xF0 && lead < 0xF5 ? 4 : lead >= 0xE0 ? 3 : 2;
  if (lead < 0xC2 || lead >= 0xF5 || text.size() < length) return 0;
  for (std::size_t i = 1; i < length; ++i) {
    if ((byte(i) & 0xC0) != 0x80) return 0;
  }
  return length;
}

std::string compose(const Place& place, std::string_view what_is_wrong, std::string_view value,
                    std::string_view accepted) {
  std::string text = to_string(place);
  if (!value.empty()) text += fmt::format("'{}' ", printable(value));
  text += what_is_wrong;
  if (!accepted.empty()) text += fmt::format("; accepted: {}", accepted);
  return text;
}

}  // namespace

std::string printable(std::string_view text, std::size_t max_bytes) {
  std::string shown;
  while (!text.empty()) {
    const std::size_t length = utf8_length(text);
    const auto lead = static_cast<unsigned char>(text[0]);
    const bool plain = length > 0 && lead >= 0x20 && lead != 0x7F;
    const std::string piece =
        plain ? std::string(text.substr(0, length)) : fmt::format("\\x{:02X}", lead);
    if (shown.size() + piece.size() > max_bytes) return shown + "...";
    shown += piece;
    text.remove_prefix(plain ? length : 1);
  }
  return shown;
}

std::string to_string(const Place& place) {
  std::string text = place.file;
  if (place.line > 0) text += fmt::format("{}{}", text.empty() ? "line " : ":", place.line);
  if (place.line > 0 && place.column > 0) text += fmt::format(":{}", place.column);
  if (!text.empty()) text += ": ";
  if (!place.key.empty()) text += place.key + ": ";
  return text;
}

Error::Error(ErrorKind kind, Place place, std::string_view what_is_wrong, std::string_view value,
             std::string_view accepted)
    : std::runtime_error(compose(place, what_is_wrong, value, accepted)),
      kind_(kind),
      place_(std::move(place)),
      value_(value),
      accepted_(accepted) {}

}  // namespace brink
