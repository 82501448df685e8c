#pragma once
/// Two equal targets side by side: when does the line show two? By travel times and the returned pulse's envelope, at
/// once; no multiple echoes between the targets. settle() in section.hpp puts the full-wave measurement in its place.
#include <optional>
#include <vector>

#include "survey/answers.hpp"
#include "survey/cases.hpp"

namespace gg {

/// Two-way time from a round target, the line crossing it at right angles: shortest path transmitter, rim, receiver.
/// @param x       m, middle of the antenna from the target's axis
/// @param radius  m, >= 0; the top stands at the case's depth
/// Taking the path to the axis less the radius is slightly short, leaving the radius out is up to 20 % off in the speed
/// it implies. Here the point on the rim is where the two legs make equal angles, found twice over; good to 1e-5.
double echo_time(const Case& c, double x, double radius);

/// echo_time() over distance, computed once and read many times.
class EchoCurve {
  public:
    /// @param reach  m, > 0, farthest distance that will be read; beyond it the end's slope goes on
    EchoCurve(const Case& c, double radius, double reach);
    /// Time later than at x = 0, s.
    double later(double x) const;
    double apex = 0.0;  ///< s

  private:
    std::vector<double> later_;
    double step_ = 1.0;
};

/// Envelope of both targets' echoes together along the line, in the row of the apex: targets at -gap/2 and gap/2.
double pair_response(const EchoPulse& echo, const EchoCurve& curve, double gap, double x);

/// Dip at the middle, 0 to 1 of the peak.
double pair_dip(const EchoPulse& echo, const EchoCurve& curve, double gap);
/// Whether that dip is at least `apart_dip`; quicker, because the first peak high enough tells.
bool pair_parts(const EchoPulse& echo, const EchoCurve& curve, double gap);

/// Smallest distance centre to centre from which the dip stays at or above `apart_dip`, m; no less than the targets'
/// own diameter, at which they touch.
Value smallest_gap(const Case& c, double radius);

/// Grade, reason and mends of the answer "apart.sideways" from its numbers and what the plan asks for.
/// @param focused  smallest gap once focused, m, where it was measured
void grade_sideways(Answer& answer, const Plan& plan, std::optional<Value> focused = {});

/// sqrt(v r W / 2): v m/s, r m, W s; all > 0, else 0. (Annan & Cosway 1992, from memory)
double lateral_rule(double speed, double range, double width);

}  // namespace gg
