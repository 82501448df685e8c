#pragma once
/// The lines of a survey on its site, and where a long target is crossed.
#include <vector>

#include "survey/answers.hpp"
#include "survey/site.hpp"

namespace gg {

struct Walk {
    std::vector<LanesPicture::Line> lines;   ///< the antenna's middle, in walking order, up then back
    std::vector<LanesPicture::Line> tracks;  ///< of every channel
    double distance = 0.0;                   ///< m walked on lines, the way between them not counted
    double width = 0.0;                      ///< m, the site's extent across the direction of travel
    bool cut_off = false;                    ///< more lines than are drawn (a limit against runaway plans)
};
/// Lines at the plan's spacing and bearing, laid so that as many stand left as right of the site's middle.
/// @param plan  sane
Walk walk_of(const Plan& plan);

struct Crossings {
    SitePoint from, to;           ///< the target, cut to the site
    std::vector<SitePoint> hits;  ///< in order along the target
    std::vector<double> at;       ///< m along it from `from`
    double length = 0.0;          ///< m
};
/// The long target runs through the site's centroid at its bearing, half its length either way.
Crossings crossings_of(const Plan& plan, const Walk& walk);

/// Stretches between neighbouring hits, or an end and the first hit, over which a picture has nothing: more than
/// `bridge` between hits, more than half of it at an end.
std::vector<LanesPicture::Gap> gaps_of(const Crossings& crossings, double bridge);

/// Largest distance between neighbouring hits along an endless target, m; 0 when no line crosses it. Two ways: the
/// nearer.
double distance_between_hits(const Plan& plan);
/// Widest gap between neighbouring tracks when passes stand `spacing` apart, each of `channels` tracks.
double widest_gap(double spacing, int channels, double channel_spacing);

}  // namespace gg
