#include <cmath>
#include <nlohmann/json.hpp>
#include <stdexcept>

#include "brink/record/document.hpp"

namespace brink {

namespace {

using Json = nlohmann::ordered_json;

struct Convert {
  Json operator()(std::nullptr_t) const { return nullptr; }
  Json operator()(bool v) const { return v; }
  Json operator()(std::int64_t v) const { return v; }
  Json operator()(double v) const {
    // The library would write null without a word.
    if (!std::isfinite(v))
      throw std::logic_error("a number that is not finite reached a JSON document");
    return v;
  }
  Json operator()(const std::string& v) const { return v; }
  Json operator()(const Array& v) const {
    Json list = Json::array();
    for (const Value& item : v) list.push_back(std::visit(*this, item.content()));
    return list;
  }
  Json operator()(const Object& v) const {
    Json members = Json::object();
    for (const auto& [key, value] : v.members())
      members.push_back({key, std::visit(*this, value.content())});
    return members;
  }
};

}  // namespace

std::string to_json(const Value& value) {
  const Json json = std::visit(Convert{}, value.content());
  return json.dump(2, ' ', false, Json::error_handler_t::replace) + "\n";
}

}  // namespace brink
