#include "survey/lines.hpp"

#include <algorithm>
#include <cmath>

namespace gg {
namespace {

constexpr int most_lines = 2000;
// A crossing flatter than this (about a twentieth of a degree) is no crossing that a crew could walk.
constexpr double least_sine = 1e-3;

void lay(const Plan& plan, double bearing, bool second, Walk& walk) {
    const std::vector<SitePoint>& outline = plan.lanes.outline;
    const double dx = std::sin(bearing), dy = std::cos(bearing), ax = dy, ay = -dx;  // along, and to the right
    double low = 1e300, high = -1e300;
    const SitePoint origin = outline[0];
    for (const SitePoint& p : outline) {
        const double s = (p.x - origin.x) * ax + (p.y - origin.y) * ay;
        low = std::min(low, s);
        high = std::max(high, s);
    }
    if (!second) walk.width = high - low;
    const double spacing = plan.lanes.spacing, swath = (plan.antenna.channels - 1) * plan.antenna.channel_spacing;
    // As many passes as fit with their swath, the rest of the width shared between both edges; one at least.
    const double room = std::max(0.0, high - low - swath);
    const double fit = std::floor(room / spacing + 1e-9);
    const int count = static_cast<int>(std::min<double>(most_lines, fit)) + 1;
    if (fit >= most_lines) walk.cut_off = true;
    const double first = 0.5 * (low + high) - 0.5 * (count - 1) * spacing;
    bool back = false;
    for (int i = 0; i < count; ++i) {
        for (int channel = -1; channel < plan.antenna.channels; ++channel) {
            const bool track = channel >= 0;
            const double aside = track ? channel * plan.antenna.channel_spacing - 0.5 * swath : 0.0;
            // A line along the very edge of the site is walked on the inside of it.
            const double s =
                std::clamp(first + i * spacing + aside, low + 1e-9 * (high - low), high - 1e-9 * (high - low));
            const SitePoint at{origin.x + s * ax, origin.y + s * ay};
            for (const auto& [a, b] : inside(outline, at, dx, dy)) {
                LanesPicture::Line line{{at.x + a * dx, at.y + a * dy}, {at.x + b * dx, at.y + b * dy}, second};
                if (track) {
                    walk.tracks.push_back(line);
                } else {
                    if (back) std::swap(line.from, line.to);
                    walk.lines.push_back(line);
                    walk.distance += b - a;
                }
            }
        }
        back = !back;
    }
}

}  // namespace

Walk walk_of(const Plan& plan) {
    Walk walk;
    if (!(area_of(plan.lanes.outline) > 0.0)) return walk;
    lay(plan, plan.lanes.bearing, false, walk);
    if (plan.lanes.both_ways) lay(plan, plan.lanes.bearing + 0.5 * pi, true, walk);
    return walk;
}

Crossings crossings_of(const Plan& plan, const Walk& walk) {
    Crossings c;
    const std::vector<SitePoint>& outline = plan.lanes.outline;
    if (!(area_of(outline) > 0.0)) return c;
    const double dx = std::sin(plan.target.bearing), dy = std::cos(plan.target.bearing);
    const SitePoint middle = centroid_of(outline);
    // The stretch through the centroid, or on a hollow site the one nearest to it.
    double from = 0.0, to = 0.0, nearest = 1e300;
    for (const auto& [a, b] : inside(outline, middle, dx, dy)) {
        const double away = a > 0.0 ? a : b < 0.0 ? -b : 0.0;
        if (away < nearest) nearest = away, from = a, to = b;
    }
    if (nearest == 0.0) {
        from = std::max(from, -0.5 * plan.target.length);
        to = std::min(to, 0.5 * plan.target.length);
    } else {
        to = std::min(to, from + plan.target.length);
    }
    c.from = {middle.x + from * dx, middle.y + from * dy};
    c.to = {middle.x + to * dx, middle.y + to * dy};
    c.length = to - from;
    std::vector<double> at;
    for (const auto& track : walk.tracks) {
        const double tx = track.to.x - track.from.x, ty = track.to.y - track.from.y, length = std::hypot(tx, ty);
        const double sine = (dx * ty - dy * tx) / length;
        if (!(std::abs(sine) > least_sine)) continue;
        const double rx = track.from.x - c.from.x, ry = track.from.y - c.from.y;
        const double along_target = (rx * ty - ry * tx) / (sine * length), along_track = (rx * dy - ry * dx) / sine;
        if (along_target < 0.0 || along_target > c.length || along_track < 0.0 || along_track > length) continue;
        at.push_back(along_target);
    }
    std::sort(at.begin(), at.end());
    c.at = at;
    for (double s : at) c.hits.push_back({c.from.x + s * dx, c.from.y + s * dy});
    return c;
}

std::vector<LanesPicture::Gap> gaps_of(const Crossings& c, double bridge) {
    std::vector<LanesPicture::Gap> gaps;
    if (!(c.length > 0.0)) return gaps;
    const double dx = (c.to.x - c.from.x) / c.length, dy = (c.to.y - c.from.y) / c.length;
    const auto dark = [&](double a, double b) {
        if (!(b - a > 1e-9 * c.length)) return;
        gaps.push_back({{c.from.x + a * dx, c.from.y + a * dy}, {c.from.x + b * dx, c.from.y + b * dy}});
    };
    // Each hit lights half the bridge either way; what no hit lights is a gap.
    double lit = 0.0;
    for (double s : c.at) {
        if (s - 0.5 * bridge > lit) dark(lit, s - 0.5 * bridge);
        lit = std::max(lit, s + 0.5 * bridge);
    }
    dark(lit, c.length);
    return gaps;
}

double widest_gap(double spacing, int channels, double channel_spacing) {
    if (channels <= 1 || !(channel_spacing > 0.0)) return spacing;
    std::vector<double> at;
    for (int i = 0; i < channels; ++i) at.push_back(std::fmod(i * channel_spacing, spacing));
    std::sort(at.begin(), at.end());
    double widest = at.front() + spacing - at.back();
    for (std::size_t i = 1; i < at.size(); ++i) widest = std::max(widest, at[i] - at[i - 1]);
    return widest;
}

double distance_between_hits(const Plan& plan) {
    const double gap = widest_gap(plan.lanes.spacing, plan.antenna.channels, plan.antenna.channel_spacing);
    const double angle = plan.target.bearing - plan.lanes.bearing;
    const double sine = std::abs(std::sin(angle)), cosine = std::abs(std::cos(angle));
    double nearest = sine > least_sine ? gap / sine : 0.0;
    if (plan.lanes.both_ways && cosine > least_sine && (nearest == 0.0 || gap / cosine < nearest))
        nearest = gap / cosine;
    return nearest;
}

}  // namespace gg
