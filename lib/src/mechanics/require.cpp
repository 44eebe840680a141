#include "require.hpp"

#include <fmt/format.h>

#include <cmath>

#include "brink/base/error.hpp"
#include "brink/base/number.hpp"

namespace brink {
namespace {

[[noreturn]] void refuse(std::string_view name, std::string_view what, double value,
                         std::string_view accepted) {
  const std::string text = std::isfinite(value) ? shortest(value)
                           : std::isnan(value)  ? "nan"
                                                : "infinity";
  throw Error(ErrorKind::argument, Place{{}, 0, 0, std::string(name)}, what, text, accepted);
}

}  // namespace

void require_finite(std::string_view name, double value) {
  if (!std::isfinite(value)) refuse(name, "is not finite", value, "a finite number");
}

void require_positive(std::string_view name, double value) {
  require_finite(name, value);
  if (value <= 0.0) refuse(name, "is not above 0", value, "a number above 0");
}

void require_not_negative(std::string_view name, double value) {
  require_finite(name, value);
  if (value < 0.0) refuse(name, "is below 0", value, "0 or more");
}

void require_between(std::string_view name, double value, double low, double high) {
  require_finite(name, value);
  // Limits may be computed: six digits are enough to act on.
  const std::string accepted = fmt::format("{:.6g} to {:.6g}", low, high);
  if (value < low) refuse(name, "is too small", value, accepted);
  if (value > high) refuse(name, "is too large", value, accepted);
}

void require_below(std::string_view name, double value, double low, double limit) {
  require_finite(name, value);
  const std::string accepted = shortest(low) + " or more and below " + shortest(limit);
  if (value < low) refuse(name, "is too small", value, accepted);
  if (value >= limit) refuse(name, "is too large", value, accepted);
}

void require_friction(std::string_view name, Angle friction) {
  const double deg = friction.deg();
  require_finite(name, deg);
  if (deg < 0.0 || deg >= 90.0)
    refuse(name, "is no friction angle", deg, "0 or more and below 90 degrees");
}

}  // namespace brink
