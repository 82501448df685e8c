#pragma once
/// Two thin reflectors one above the other: when does the trace show two?
#include "survey/echo_pulse.hpp"

namespace gg {

/// Depth of a dip, as a share of the lower peak, at which two peaks count as two: 1 - 8/pi^2 = 0.189, the dip that
/// Rayleigh (1879, Phil. Mag. 8, from memory) took for two slit images just told apart. Taken here on amplitude, the
/// stricter side, because what an operator looks at is the amplitude, and 19 % of it (1.8 dB) stands clear of ordinary
/// clutter where a mere flat spot does not.
constexpr double apart_dip = 0.18943;

/// Dip between the crests of two equal echoes `delay` s apart, 0 to 1 of the lower crest; 0 where there is only one
/// crest. The trace is looked at, with the echo's phase turned so that each echo alone shows one upright crest: in the
/// envelope two overlapping echoes beat, so that a dip comes, goes and comes again with distance, and a rectified trace
/// counts side lobes; the crests are what is picked on a trace, and their dip only deepens with distance.
double dip_between(const EchoPulse& echo, double delay);

/// Smallest two-way delay from which the dip reaches `dip`, s; 0 gives the flat spot. Where the echo rings (a side
/// crest over half the main one) crests no longer tell echoes from ringing, and the envelope decides.
Value smallest_delay(const EchoPulse& echo, double dip);

}  // namespace gg
