#pragma once
/// What a radar would record along a line over round targets in flat-layered ground: two-dimensional, full-wave.
///
/// Coordinates: x along the line, z down, surface at z = 0, both m. The targets run at right angles to the line,
/// without end. At position x the transmitter stands at x - separation/2, the receiver at x + separation/2. Time: t = 0
/// is the moment at which the sent pulse peaks, so an echo's peak stands near its two-way travel time.
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

#include "wave/pulse.hpp"

namespace gg {

enum class Polarisation : std::uint8_t {
    along,  ///< electric field along the targets: what is recorded is E_y of a line current along y
    across  ///< electric field across the targets, along the line: E_x of a current sheet element along x
};

/// A pipe, bar, duct, void or boulder, cut at right angles.
struct RoundTarget {
    double x = 0.0;       ///< m along the line
    double depth = 0.0;   ///< m, surface to the centre
    double radius = 0.0;  ///< m, outer, > 0
    Material inside;      ///< Model::metal reflects everything
    struct Wall {
        double thickness = 0.0;  ///< m, > 0 and less than the radius; the inside fills the rest
        Material material;
        bool operator==(const Wall&) const = default;
    };
    std::optional<Wall> wall;
    bool operator==(const RoundTarget&) const = default;
};

/// What is keyed into the instrument: where and when the field is sampled.
struct Sampling {
    double first = 0.0;     ///< m, first antenna position (midpoint of transmitter and receiver)
    double step = 0.02;     ///< m between positions, > 0
    int traces = 1;         ///< 1 to 4096
    double start = 0.0;     ///< s, time of the first sample; 0 is the peak of the sent pulse
    double window = 60e-9;  ///< s, > 0; sample i is taken at start + i * window / samples
    int samples = 512;      ///< 2 to 8192
    bool operator==(const Sampling&) const = default;
};

/// White noise, the same every time for the same seed. Its root mean square per sample lies `dynamic_range` below the
/// peak of the direct wave (the strongest thing the receiver has to take in), and falls with the root of the stacks.
struct NoiseFloor {
    double dynamic_range = 120.0;  ///< dB, of one unstacked trace
    int stacks = 1;                ///< >= 1
    std::uint64_t seed = 1;
    bool operator==(const NoiseFloor&) const = default;
};

struct Scene {
    Stack ground;
    PulseShape pulse;         ///< time course of the source current, peak 1
    double separation = 0.0;  ///< m, transmitter to receiver, along the line, >= 0
    double height = 0.0;      ///< m above the surface, >= 0, both antennas
    Polarisation polarisation = Polarisation::along;
    std::vector<RoundTarget> targets;  ///< 0 to 6, all within one layer
    Sampling sampling;
    NoiseFloor noise;
    bool operator==(const Scene&) const = default;
};

/// The recorded field, V/m for a source current of peak 1 A (along: a line current; across: 1 A m per metre of sheet).
/// Fields in two dimensions spread as 1/sqrt(r), a real antenna's as 1/r: shapes, times and relative strengths between
/// neighbours are true, levels against depth are not a power budget.
struct Section {
    int traces = 0, samples = 0;
    double first = 0.0, step = 0.0;  ///< m
    double start = 0.0, dt = 0.0;    ///< s
    std::vector<double>
        targets;                 ///< traces x samples, trace after trace: echoes of the targets, all couplings included
    std::vector<double> layers;  ///< one trace, the same at all positions: echoes of the boundaries below the surface
    std::vector<double> direct;  ///< one trace, the same at all positions: through the air and off the surface
    std::vector<double> noise;   ///< traces x samples
    Issue issue = Issue::none;   ///< none or outside_band: the arrays stand; else they are empty
    std::string reason;          ///< one sentence where it was refused; empty when computed

    bool ok() const { return issue == Issue::none || issue == Issue::outside_band; }
    double at(int trace, int sample) const {
        return targets[static_cast<std::size_t>(trace) * static_cast<std::size_t>(samples) +
                       static_cast<std::size_t>(sample)];
    }
};

/// Empty when the scene can be computed, else one sentence that says what is wrong and what would be right: targets
/// that straddle a boundary, touch each other or break the surface, more than six, numbers outside their ranges.
std::string fault_of(const Scene& scene);

/// The worst of what the scene's materials say of themselves at the centre frequency. Other than none or outside_band:
/// the section is refused.
Issue materials_issue(const Scene& scene);

/// The section, from Maxwell's equations: multiple scattering between targets and with all boundaries is included.
/// Between the samples of the scene nothing is smoothed: a step, window or interval too coarse shows as it would in the
/// field. Accuracy: 1e-3 of the strongest echo (the median over
/// random scenes of the largest deviation), 4e-3 in nine of ten, mostly late in the window; echoes more than 100 dB
/// below the direct wave less well. See section.cpp for what sets it.
/// @param care  0.01 to 100: every cut-off and margin of the engine tighter by it, at its price in time; above 1 to see
/// what they cost, 0.1 where 1 % will do
Section section_of(const Scene& scene, double care = 1.0);

}  // namespace gg
