#pragma once
/// The section as a table that other programs read.
#include <string>

#include "survey/section.hpp"

namespace gg {

/// What stands in the table.
struct SectionOrder {
    SectionParts parts;
    Polarisation polarisation = Polarisation::along;
    bool focused = false;    ///< the migrated image instead of the traces
    bool even_gain = false;  ///< the record times even_gain(), before any focusing
    bool operator==(const SectionOrder&) const = default;
};

/// CSV (RFC 4180 with lines of "#" before it that say what it is). Header: "time_ns" (focused: "depth_m"), then each
/// antenna position in m; one row per sample (or depth). Values in V/m for a source current of peak 1 A, six digits.
/// Detail::exact: every trace, the whole window. Refused: empty, and `fault` is the section's sentence.
std::string write_section(const Plan& plan, const SectionOrder& order, std::string& fault);

}  // namespace gg
