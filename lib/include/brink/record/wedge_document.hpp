// Wedges as values of a record.
#pragma once

#include "brink/mechanics/wedge_support.hpp"
#include "brink/record/document.hpp"

namespace brink {

// Every value that went in, defaults too.
Object wedge_inputs(const WedgeCase& wedge, const WedgeResult& result,
                    const std::optional<WedgeTarget>& target = {});

// Every key is always there; what does not exist (a wedge that does not form has no volume, a block
// that lifts no driving force, a target that no bolt reaches no force) is null.
Object wedge_value(const WedgeResult& result, const std::optional<WedgeSupport>& support = {});

}  // namespace brink
