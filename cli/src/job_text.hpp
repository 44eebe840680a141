// The whole job as people read it.
#pragma once

#include <string>

#include "brink/record/job.hpp"

namespace brink::cli {

// Sets, then for every face what can move and the factors of safety it calls for, held against the
// target; the cautions close it.
std::string job_text(const Job& job);

}  // namespace brink::cli
