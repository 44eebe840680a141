// Block toppling as values of a record.
#pragma once

#include "brink/mechanics/toppling.hpp"
#include "brink/record/document.hpp"

namespace brink {

// Every value that went in, defaults too; the geometry where the blocks were made from one.
Object topple_inputs(const ToppleInput& input, const std::optional<ToppleGeometry>& geometry);

// Blocks by number, from 1 at the toe.
Value topple_value(const ToppleResult& result);

std::string_view to_string(BlockMode mode);  // "stable", "topples", "slides"

}  // namespace brink
