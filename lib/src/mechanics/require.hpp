// Checks of arguments shared by the mechanics: each throws ErrorKind::argument naming the quantity.
#pragma once

#include <string>
#include <string_view>

#include "brink/base/angle.hpp"

namespace brink {

void require_positive(std::string_view name, double value);
void require_not_negative(std::string_view name, double value);
void require_finite(std::string_view name, double value);
// low <= value <= high.
void require_between(std::string_view name, double value, double low, double high);
// low <= value < limit.
void require_below(std::string_view name, double value, double low, double limit);
// 0 <= friction < 90 degrees.
void require_friction(std::string_view name, Angle friction);

}  // namespace brink
