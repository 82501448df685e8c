#include "wave/layers.hpp"

#include <algorithm>

namespace gg {
namespace {

double thickness_of(const Slab& slab) { return slab.thickness > 0.0 ? slab.thickness : 0.0; }

/// Stretches of the way straight down to `depth`: layer and metres in it.
struct Stretch {
    std::size_t layer;
    double length;
};
std::vector<Stretch> way_down(const Stack& stack, double depth) {
    std::vector<Stretch> way;
    double left = depth;
    for (std::size_t i = 0; i < stack.slabs.size(); ++i) {
        const bool last = i + 1 == stack.slabs.size();
        const double here = last ? left : std::min(left, thickness_of(stack.slabs[i]));
        if (here > 0.0) way.push_back({i, here});
        left -= here;
        if (!(left > 0.0)) break;
    }
    return way;
}

Issue issue_of(double length) {
    if (!std::isfinite(length)) return Issue::not_a_number;
    return length >= 0.0 ? Issue::none : Issue::out_of_range;
}

}  // namespace

int layer_at(const Stack& stack, double depth) {
    const int last = static_cast<int>(stack.slabs.size()) - 1;
    double base = 0.0;
    for (int i = 0; i < last; ++i) {
        base += thickness_of(stack.slabs[static_cast<std::size_t>(i)]);
        if (!(depth > base)) return i;
    }
    return std::max(last, 0);
}

double top_of(const Stack& stack, int index) {
    double top = 0.0;
    for (int i = 0; i < index && i < static_cast<int>(stack.slabs.size()); ++i)
        top += thickness_of(stack.slabs[static_cast<std::size_t>(i)]);
    return top;
}

std::vector<double> speeds(const Stack& stack, double frequency) {
    std::vector<double> result;
    result.reserve(stack.slabs.size());
    for (const Slab& slab : stack.slabs) result.push_back(plane_wave(slab.material, frequency).speed);
    return result;
}

Value time_down(const Stack& stack, double depth, double frequency) {
    Issue issue = stack.slabs.empty() ? Issue::out_of_range : issue_of(depth);
    if (issue != Issue::none) return {0.0, issue};
    double time = 0.0;
    for (const auto [layer, length] : way_down(stack, depth)) {
        const PlaneWave wave = plane_wave(stack.slabs[layer].material, frequency);
        issue = worse(issue, wave.issue);
        time += length / wave.speed;
    }
    return finite(time, issue);
}

Value depth_after(const Stack& stack, double time, double frequency) {
    Issue issue = stack.slabs.empty() ? Issue::out_of_range : issue_of(time);
    if (issue != Issue::none) return {0.0, issue};
    double depth = 0.0, left = time;
    for (std::size_t i = 0; i < stack.slabs.size(); ++i) {
        const PlaneWave wave = plane_wave(stack.slabs[i].material, frequency);
        const double all = thickness_of(stack.slabs[i]);
        const bool last = i + 1 == stack.slabs.size();
        issue = worse(issue, wave.issue);
        if (last || left <= all / wave.speed) return finite(depth + left * wave.speed, issue);
        depth += all;
        left -= all / wave.speed;
    }
    return finite(depth, issue);
}

Value effective_speed(const Stack& stack, double depth, double frequency) {
    if (stack.slabs.empty()) return {0.0, Issue::out_of_range};
    if (depth == 0.0) {
        const PlaneWave wave = plane_wave(stack.slabs.front().material, frequency);
        return finite(wave.speed, wave.issue);
    }
    const Value time = time_down(stack, depth, frequency);
    if (!(time.value > 0.0)) return {0.0, worse(time.issue, Issue::out_of_range)};
    return finite(depth / time.value, time.issue);
}

Ray ray_to(const Stack& stack, double height, double offset, double depth, double frequency) {
    Ray ray;
    ray.issue = worse(worse(issue_of(height), issue_of(depth)), issue_of(std::abs(offset)));
    if (stack.slabs.empty()) ray.issue = worse(ray.issue, Issue::out_of_range);
    if (ray.issue != Issue::none) {
        ray.points = {{0.0, 0.0}, {0.0, 0.0}};
        return ray;
    }
    // Kernel notation: h_i thickness crossed, v_i speed, r_i = v_i / v_max, t = tan of the angle in the fastest layer.
    // x(t) = sum h_i r_i t / sqrt(1 + t^2 (1 - r_i^2)) rises and bends down, so that Newton from t = 0 climbs to the
    // root and never passes it; the fastest layer's straight term keeps the slope away from zero.
    std::vector<double> h, v;
    if (height > 0.0) {
        h.push_back(height);
        v.push_back(speed_of_light);
    }
    for (const auto [layer, length] : way_down(stack, depth)) {
        const PlaneWave wave = plane_wave(stack.slabs[layer].material, frequency);
        ray.issue = worse(ray.issue, wave.issue);
        h.push_back(length);
        v.push_back(wave.speed);
    }
    const double x = std::abs(offset), sign = offset < 0.0 ? -1.0 : 1.0;
    ray.points.push_back({0.0, height > 0.0 ? -height : 0.0});
    if (h.empty()) {  // along the surface
        const double speed = plane_wave(stack.slabs.front().material, frequency).speed;
        ray.points.push_back({offset, 0.0});
        ray.time = x / speed;
        ray.slowness = x > 0.0 ? 1.0 / speed : 0.0;
        ray.length = x;
        return ray;
    }
    const double v_max = *std::max_element(v.begin(), v.end());
    double t = 0.0;
    for (int round = 0; round < 100; ++round) {
        double reach = 0.0, slope = 0.0;
        for (std::size_t i = 0; i < h.size(); ++i) {
            const double r = v[i] / v_max, q = 1.0 / std::sqrt(1.0 + t * t * (1.0 - r) * (1.0 + r));
            reach += h[i] * r * t * q;
            slope += h[i] * r * q * q * q;
        }
        const double step = (x - reach) / slope;
        t += step;
        if (!(std::abs(step) > 1e-15 * t)) break;
    }
    ray.slowness = t / std::sqrt(1.0 + t * t) / v_max;
    Crossing at = ray.points.front();
    for (std::size_t i = 0; i < h.size(); ++i) {
        const double r = v[i] / v_max, across = r * t / std::sqrt(1.0 + t * t * (1.0 - r) * (1.0 + r));
        const double length = h[i] * std::sqrt(1.0 + across * across);
        at = {at.x + sign * h[i] * across, at.depth + h[i]};
        ray.points.push_back(at);
        ray.length += length;
        ray.time += length / v[i];
    }
    ray.points.back() = {offset, depth};
    return ray;
}

}  // namespace gg
