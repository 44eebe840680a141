// A tree of values on its way to JSON. Results are turned into documents here in the library, so
// that the program and anyone who embeds it write the same record; only json.cpp knows the JSON
// library.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <utility>
#include <variant>
#include <vector>

#include "brink/orientation/face.hpp"

namespace brink {

class Value;
using Array = std::vector<Value>;

// Keys keep the order in which they were added.
class Object {
 public:
  Object() = default;
  Object(std::initializer_list<std::pair<std::string, Value>> members);
  // Appends; a key is added once only (asserted).
  Object& add(std::string key, Value value);
  const std::vector<std::pair<std::string, Value>>& members() const { return members_; }
  // The value under `key`, or null where there is none.
  const Value* find(std::string_view key) const;

 private:
  std::vector<std::pair<std::string, Value>> members_;
};

class Value {
 public:
  using Content =
      std::variant<std::nullptr_t, bool, std::int64_t, double, std::string, Array, Object>;

  Value() = default;        // null
  Value(std::nullptr_t) {}  // NOLINT(google-explicit-constructor): values are written in place
  Value(bool v) : content_(v) {}                                      // NOLINT
  Value(int v) : content_(std::int64_t{v}) {}                         // NOLINT
  Value(std::int64_t v) : content_(v) {}                              // NOLINT
  Value(std::uint64_t v) : content_(static_cast<std::int64_t>(v)) {}  // NOLINT
  Value(double v) : content_(v + 0.0) {}                              // NOLINT
  Value(std::string v) : content_(std::move(v)) {}                    // NOLINT
  Value(std::string_view v) : content_(std::string(v)) {}             // NOLINT
  Value(const char* v) : content_(std::string(v)) {}                  // NOLINT
  Value(Array v) : content_(std::move(v)) {}                          // NOLINT
  Value(Object v) : content_(std::move(v)) {}                         // NOLINT
  template <typename T>
  Value(const std::optional<T>& v) {  // NOLINT
    if (v) *this = Value(*v);
  }

  const Content& content() const { return content_; }

 private:
  Content content_ = nullptr;
};

// A number that may be infinite or not exist: infinite gives the text "infinite", not-a-number
// gives null.
Value number_or_word(double value);

Value plane_value(const Plane& plane);  // {dip_deg, dip_direction_deg}
Value face_value(const Face& face);     // the same keys
Value line_value(const Line& line);     // {trend_deg, plunge_deg}

// UTF-8 JSON with two-space indents and a final newline; doubles in their shortest round-trip form.
// Broken UTF-8 in texts is replaced by U+FFFD. A non-finite number in the tree is a defect of the
// caller: std::logic_error.
std::string to_json(const Value& value);

// The document every command prints: {brink, command, inputs, warnings, result}.
Value result_document(std::string_view command, Value inputs,
                      const std::vector<std::string>& warnings, Value result);

// The program's version, from the build.
std::string_view version();

}  // namespace brink
