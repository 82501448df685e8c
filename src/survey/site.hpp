#pragma once
/// Plane geometry of a site: where straight lines run inside an outline.
#include <utility>
#include <vector>

#include "survey/plan.hpp"

namespace gg {

/// Area enclosed, m2, whatever the sense of the outline; 0 for fewer than three corners.
double area_of(const std::vector<SitePoint>& outline);
/// Centre of area; the corners' mean where there is no area.
SitePoint centroid_of(const std::vector<SitePoint>& outline);

/// Stretches of the endless line through `at` in direction (dx, dy) (unit) that lie inside the outline, as distances
/// from `at`, ascending. Even-odd rule; a line along an edge counts for one side only, so that neighbours never count
/// it twice.
std::vector<std::pair<double, double>> inside(const std::vector<SitePoint>& outline, SitePoint at, double dx,
                                              double dy);

}  // namespace gg
