// Wedges as values of a record.
#pragma once

#include "brink/mechanics/wedge_equilibrium.hpp"
#include "brink/record/document.hpp"

namespace brink {

// Every value that went in, defaults too.
Value wedge_inputs(const WedgeCase& wedge, const WedgeResult& result);

// Every key is always there; what does not exist (a wedge that does not form has no volume, a block
// that lifts no driving force) is null.
Value wedge_value(const WedgeResult& result);

}  // namespace brink
