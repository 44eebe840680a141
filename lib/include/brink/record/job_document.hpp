// The whole job as a record.
#pragma once

#include "brink/record/document.hpp"
#include "brink/record/job.hpp"

namespace brink {

// {site, files[] {name, sha256}, seed}.
Value job_inputs(const Job& job);

// {title, readings{} as of the command readings, sets{} as of the command sets, faces[], target,
// cautions[]}. A face is {name, height_m, then as of the command kinematics, planes[] {set,
// strength, dry, as_written, meets_target}, wedges[] {sets[2], line, strengths[2], dry, as_written,
// meets_target}, no_factors_because}. `dry` is under the block's own weight, `as_written` with the
// water and the shaking of the site file; each as of the commands plane and wedge.
Value job_result(const Job& job);

}  // namespace brink
