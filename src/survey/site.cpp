#include "survey/site.hpp"

#include <algorithm>
#include <cmath>

namespace gg {
namespace {

double twice_area(const std::vector<SitePoint>& o) {
    double sum = 0.0;
    for (std::size_t i = 0; i < o.size(); ++i) {
        const SitePoint &a = o[i], &b = o[(i + 1) % o.size()];
        // From the first corner: far from the origin the products would eat the digits.
        sum += (a.x - o[0].x) * (b.y - o[0].y) - (b.x - o[0].x) * (a.y - o[0].y);
    }
    return sum;
}

}  // namespace

double area_of(const std::vector<SitePoint>& outline) {
    return outline.size() < 3 ? 0.0 : 0.5 * std::abs(twice_area(outline));
}

SitePoint centroid_of(const std::vector<SitePoint>& o) {
    if (o.empty()) return {};
    const auto count = static_cast<double>(o.size());
    SitePoint mean;
    for (const SitePoint& p : o) mean.x += p.x / count, mean.y += p.y / count;
    const double twice = o.size() < 3 ? 0.0 : twice_area(o);
    if (!(std::abs(twice) > 1e-9)) return mean;
    double x = 0.0, y = 0.0;
    for (std::size_t i = 0; i < o.size(); ++i) {
        const double ax = o[i].x - o[0].x, ay = o[i].y - o[0].y;
        const SitePoint& next = o[(i + 1) % o.size()];
        const double bx = next.x - o[0].x, by = next.y - o[0].y;
        const double cross = ax * by - bx * ay;
        x += (ax + bx) * cross;
        y += (ay + by) * cross;
    }
    const SitePoint c{o[0].x + x / (3.0 * twice), o[0].y + y / (3.0 * twice)};
    return std::isfinite(c.x) && std::isfinite(c.y) ? c : mean;
}

std::vector<std::pair<double, double>> inside(const std::vector<SitePoint>& o, SitePoint at, double dx, double dy) {
    std::vector<double> cuts;
    for (std::size_t i = 0; i < o.size(); ++i) {
        const SitePoint &a = o[i], &b = o[(i + 1) % o.size()];
        const double side_a = (a.x - at.x) * dy - (a.y - at.y) * dx, side_b = (b.x - at.x) * dy - (b.y - at.y) * dx;
        if ((side_a > 0.0) == (side_b > 0.0)) continue;
        const double share = side_a / (side_a - side_b);
        cuts.push_back((a.x + share * (b.x - a.x) - at.x) * dx + (a.y + share * (b.y - a.y) - at.y) * dy);
    }
    std::sort(cuts.begin(), cuts.end());
    std::vector<std::pair<double, double>> stretches;
    for (std::size_t i = 0; i + 1 < cuts.size(); i += 2) {
        if (cuts[i + 1] > cuts[i]) stretches.emplace_back(cuts[i], cuts[i + 1]);
    }
    return stretches;
}

}  // namespace gg
