#pragma once
/// What digitising does to the returned pulse.
#include <span>

#include "survey/echo_pulse.hpp"

namespace gg {

/// Worst difference, over the pulse and over where the samples happen to fall on it, between the true trace and what
/// its samples give back; as a share of the pulse's peak.
struct RebuildError {
    double band_limited = 0.0;  ///< rebuilt by sinc functions, the best that can be done
    double joined = 0.0;        ///< dots joined by straight lines, as a plain display does
};
/// @param interval  s, > 0. Below a 40th of the pulse width it is computed as if it were that: the error is then an
/// upper
///                  bound, and well under 1 %.
RebuildError rebuild_error(const EchoPulse& echo, double interval);

/// sum of values[n] sinc(place - n): a band-limited signal between its samples.
/// @param place  in samples from the first
double sinc_sum(std::span<const double> values, double place);

/// ceil(window / interval), where a quotient that is whole but for rounding counts as whole. At least 2.
int samples_for(double window, double interval);

}  // namespace gg
