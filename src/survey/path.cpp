#include "survey/path.hpp"

#include <algorithm>
#include <cmath>

namespace gg {

void Path::add(double v, double h) {
    // A film of less than a micrometre turns no wave aside and would only spoil the search for the ray.
    if (!(h > 1e-6 && v > 0.0) || count == most) return;
    speed[count] = v;
    thickness[count] = h;
    ++count;
}

double Path::time_down() const {
    double t = 0.0;
    for (int i = 0; i < count; ++i) t += thickness[i] / speed[i];
    return t;
}

double Path::depth() const {
    double z = 0.0;
    for (int i = 0; i < count; ++i) z += thickness[i];
    return z;
}

Leg leg_to(const Path& path, double offset, double near) {
    // Notation: X offset, q tangent of the angle in the fastest layer, r_i = v_i / v_fastest, m_i = 1 - r_i^2,
    // x(q) = sum h_i r_i q / sqrt(1 + m_i q^2), cos(angle_i) = sqrt((1 + m_i q^2) / (1 + q^2)).
    const double X = std::abs(offset);
    double fastest = 0.0;
    for (int i = 0; i < path.count; ++i) fastest = std::max(fastest, path.speed[i]);
    double hr[Path::most], m[Path::most];
    double slope = 0.0;
    for (int i = 0; i < path.count; ++i) {
        const double r = path.speed[i] / fastest;
        m[i] = 1.0 - r * r;
        hr[i] = path.thickness[i] * r;
        slope += hr[i];
    }
    if (!(slope > 0.0)) return {};
    const double least = X / slope;
    double q = std::max(least, near);
    for (int n = 0; n < 50; ++n) {
        double x = 0.0, dx = 0.0;
        for (int i = 0; i < path.count; ++i) {
            const double root = 1.0 / std::sqrt(1.0 + m[i] * q * q), term = hr[i] * root;
            x += term * q;
            dx += term * root * root;
        }
        const double step = (X - x) / dx;
        q = std::max(q + step, least);
        // The step just taken has squared the error, and the time, stationary about the true ray, squares it again.
        if (!(std::abs(step) > 1e-4 * q)) break;
    }
    Leg leg;
    leg.tangent = q;
    const double all = std::sqrt(1.0 + q * q);
    for (int i = 0; i < path.count; ++i) {
        leg.time += path.thickness[i] * all / (path.speed[i] * std::sqrt(1.0 + m[i] * q * q));
    }
    const double sine = path.speed[path.count - 1] / fastest * q / all;
    leg.angle = std::asin(std::min(1.0, sine));
    return leg;
}

}  // namespace gg
