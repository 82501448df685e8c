#pragma once
/// Orders for Pair's section and the answers to them, as bytes: what crosses to whoever computes beside the screen, and
/// back. Both ends are one build, so the form may change with it; bytes of any other form are refused.
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>

#include "survey/section.hpp"

namespace gg {

/// How far to compute; from full on each step needs the one before.
enum class PairStep : std::uint8_t {
    coarse,    ///< the coarse section, and the raw dip at the plan's gap
    searched,  ///< as coarse, and the smallest gap that parts two in the raw section
    full,      ///< the full section
    focused,   ///< its focused picture
    raw,       ///< what is told apart in the raw section
    likely,    ///< and in the focused picture
    all        ///< both again in every ground and depth held possible, and downwards
};

struct PairOrder {
    std::uint32_t number = 0;  ///< comes back with the answer
    PairStep step = PairStep::full;
    Polarisation field = Polarisation::along;
    Plan plan;
    bool operator==(const PairOrder&) const = default;
};
/// Text.
std::string write_order(const PairOrder& order);
std::optional<PairOrder> read_order(std::string_view bytes);

/// What a step adds: a section with its arrivals, gain and turning (up to full), a focused picture with its gain, or a
/// separation. A section that was refused says why in its reason. The scene stays behind: scene_for() gives it again.
struct PairAnswer {
    std::uint32_t number = 0;
    PairStep step = PairStep::full;
    PairSection pair;
};
/// Samples cross as floats (6e-8 of each), all else as it is.
std::string write_answer(std::uint32_t number, PairStep step, const PairSection& pair);
/// Nothing for bytes that are cut short, too long, or no answer; else all arrays are as long as they say, and finite.
std::optional<PairAnswer> read_answer(std::string_view bytes);

}  // namespace gg
