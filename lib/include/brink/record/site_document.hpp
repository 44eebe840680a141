// A site file as a value of a record: every value of it, defaults too.
#pragma once

#include "brink/record/document.hpp"
#include "brink/record/site.hpp"

namespace brink {

// {file, sha256, title, readings[], sets{}, faces[], strength{}, ...} under the keys of the site
// file; what was not given is null.
Value site_value(const Site& site);

// {friction_deg, cohesion_kPa}, or null.
Value mohr_coulomb_value(const std::optional<MohrCoulomb>& strength);

}  // namespace brink
