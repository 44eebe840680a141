// A wedge's result in words and numbers for people.
#pragma once

#include <optional>
#include <string>

#include "brink/mechanics/wedge_support.hpp"

namespace brink::cli {

// Geometry, forces, mode and factor of safety, then `more`; the cautions close it. For a wedge that
// does not form, why.
std::string wedge_text(const WedgeCase& wedge, const WedgeResult& result,
                       const std::optional<WedgeSupport>& support = {},
                       const std::string& more = {});

}  // namespace brink::cli
