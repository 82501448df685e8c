#pragma once
/// Told apart or not, read from what the section shows, and the smallest gap at which two are told apart.
#include "echo/focus.hpp"

namespace gg {

/// Where the two stand out and how deep the dip between them is.
///
/// The criterion. Two targets count as two where the dip between their peaks is deeper than noise and reading can fill
/// it:
///   - noise: an envelope that rides on white noise of root mean square sigma wavers by sigma, the difference of two by
///     sqrt(2) sigma; three times that is exceeded by chance once in 700 readings.
///   - reading: 5 % of the lower peak (0.4 dB), because coupling and height vary by about that from trace to trace
///     however good the receiver is (common practice, no source). Without it a receiver free of noise would part
///     anything.
/// Side by side, the dip is down to what stands in the middle: at small gaps the flanks of both hyperbolas meet there
/// and add, brighter than either apex, with nulls of interference at its sides that are no gap between two.
/// Rayleigh's 19 % would be the optical convention; it stands for a detector's noise that a radar's stacked traces do
/// not have.
struct Dip {
    double first = 0.0, second = 0.0;  ///< where the peaks stand: m along the line, or s down the trace
    double lower_peak = 0.0;           ///< of the envelope, in the record's unit (of 1 in a focused image)
    double depth = 0.0;                ///< 0..1 of the lower peak; 0 where there is but one peak
    double needed = 0.05;              ///< 0..1 of the lower peak
    bool apart() const { return depth >= needed && depth > 0.0; }
};

enum class Reading : std::uint8_t { raw, focused };

/// Dip between the scene's first two targets side by side.
/// Raw: the envelope along the row of first arrivals, the time at which the two apexes peak. Focused: the envelope
/// along the depth of their tops in the migrated image. At the record's own positions: a step too coarse parts nothing.
/// By travel times alone the middle sinks below the peaks where the flanks are half a pulse late, at 2 sqrt(v r W / 2).
/// @param section  of this scene; its noise's level counts, not its particular values
Dip dip_sideways(const Scene& scene, const Section& section, Reading reading);

/// Dip along one trace between what arrives around two times.
/// @param trace  even samples, @param early, late  s after its first sample, early < late   @param sigma  noise, same
/// unit
Dip dip_down(const std::vector<double>& trace, double dt, double early, double late, double sigma);
/// The same between the scene's first two targets one above the other, or, with one target, its top and bottom.
Dip dip_downwards(const Scene& scene, const Section& section);

/// Smallest distance centre to centre, m, from which on the first two targets are told apart side by side: each moved
/// about their midpoint, every gap computed in full. 3 %. Where they are two as soon as they do not touch, that
/// distance. Issue::no_solution, with that gap, where even six times sqrt(v r W / 2) leaves one.
Value smallest_gap(const Scene& scene, Reading reading);
/// The same downwards: the second target straight below the first, within the layer. Issue::no_solution where the layer
/// is too thin or the lower one stays hidden.
Value smallest_drop(const Scene& scene);
/// Smallest diameter, m, of the first target from which on its top and its bottom are two echoes; depth to the top
/// kept.
Value smallest_diameter(const Scene& scene);

}  // namespace gg
