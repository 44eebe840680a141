#include "brink/record/document.hpp"

#include <cassert>
#include <cmath>

namespace brink {

Object::Object(std::initializer_list<std::pair<std::string, Value>> members) : members_(members) {}

Object& Object::add(std::string key, Value value) {
  assert(find(key) == nullptr);
  members_.emplace_back(std::move(key), std::move(value));
  return *this;
}

const Value* Object::find(std::string_view key) const {
  for (const auto& [name, value] : members_) {
    if (name == key) return &value;
  }
  return nullptr;
}

Value number_or_word(double value) {
  if (std::isnan(value)) return nullptr;
  if (std::isinf(value)) return value > 0 ? "infinite" : "-infinite";
  return value;
}

Value plane_value(const Plane& plane) {
  return Object{{"dip_deg", plane.dip.deg()}, {"dip_direction_deg", plane.dip_direction.deg()}};
}

Value face_value(const Face& face) {
  return plane_value({face.dip, face.dip_direction});
}

Value line_value(const Line& line) {
  return Object{{"trend_deg", line.trend.deg()}, {"plunge_deg", line.plunge.deg()}};
}

Value result_document(std::string_view command, Value inputs,
                      const std::vector<std::string>& warnings, Value result) {
  return Object{{"brink", version()},
                {"command", command},
                {"inputs", std::move(inputs)},
                {"warnings", Array(warnings.begin(), warnings.end())},
                {"result", std::move(result)}};
}

std::string_view version() {
  return BRINK_VERSION;
}

}  // namespace brink
