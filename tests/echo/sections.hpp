#pragma once
/// What the tests of the section share: a few scenes, measures of how traces differ, the Ricker wavelet.
#include <doctest/doctest.h>

#include <algorithm>
#include <random>

#include "echo/scene.hpp"

namespace gg {

inline Material metal() {
    Material m;
    m.model = Model::metal;
    return m;
}

inline double rms(const std::vector<double>& a) {
    double sum = 0.0;
    for (const double x : a) sum += x * x;
    return std::sqrt(sum / static_cast<double>(a.size()));
}
/// Root mean square of a - b, of b's.
inline double apart(const std::vector<double>& a, const std::vector<double>& b) {
    REQUIRE(a.size() == b.size());
    std::vector<double> d(a.size());
    for (std::size_t i = 0; i < a.size(); ++i) d[i] = a[i] - b[i];
    return rms(d) / rms(b);
}
inline double peak_of(const std::vector<double>& a) {
    double peak = 0.0;
    for (const double x : a) peak = std::max(peak, std::fabs(x));
    return peak;
}
inline std::vector<double> trace_of(const Section& s, int trace) {
    return {s.targets.begin() + trace * s.samples, s.targets.begin() + (trace + 1) * s.samples};
}

/// Spectrum per hertz of a Ricker pulse of peak 1: closed form, 2/(sqrt(pi) fp) (f/fp)^2 exp(-(f/fp)^2).
inline double ricker_spectrum(double f, double fp) {
    return f * f / (fp * fp * fp) * std::exp(-f * f / (fp * fp)) / (0.5 * std::sqrt(pi));
}

inline double between(std::mt19937& random, double low, double high) {
    // Not uniform_real_distribution: its numbers differ from library to library.
    return low + (high - low) * (static_cast<double>(random()) / 4294967296.0);
}

/// Three layers, two different targets in the second.
inline Scene two_pipes() {
    Scene s;
    s.pulse.centre_frequency = 400e6;
    s.separation = 0.16;
    s.ground.slabs = {
        {constant_material(5, 0.002), 0.4}, {constant_material(9, 0.005), 1.0}, {constant_material(15, 0.01), 0}};
    s.targets = {{0.3, 0.9, 0.055, constant_material(80, 0.05), {}}, {0.7, 0.8, 0.08, metal(), {}}};
    s.sampling = {0.0, 0.1, 11, 0.0, 40e-9, 256};
    return s;
}

/// One to three layers, slower downwards, in one of them one to three targets: metal, filled, walled, full of water;
/// either polarisation.
/// @param dispersive  layers may be moist soil and fillings water, whose permittivity changes with frequency
inline Scene random_scene(std::mt19937& random, bool dispersive = true) {
    const auto chance = [&](double share) { return between(random, 0, 1) < share; };
    const auto from = [&](double low, double high) { return between(random, low, high); };
    Scene s;
    s.pulse.centre_frequency = from(200e6, 900e6);
    s.polarisation = chance(0.5) ? Polarisation::along : Polarisation::across;
    s.separation = chance(0.2) ? 0.0 : from(0.02, 0.4);
    s.height = chance(0.5) ? 0.0 : from(0.0, 0.3);
    const int layers = 1 + static_cast<int>(from(0, 3));
    for (int i = 0; i < layers; ++i) {
        const double conductivity = from(0, 0.01);  // one draw a line: arguments are drawn in no order
        s.ground.slabs.push_back({constant_material(from(3, 20), conductivity), from(0.36, 0.8)});
        if (dispersive && chance(0.25)) {
            Material soil;
            soil.model = Model::soil_p527;
            soil.inputs[Input::water] = from(0.1, 0.25);
            soil.inputs[Input::temperature] = 15.0;
            soil.inputs[Input::sand] = 0.6;
            soil.inputs[Input::clay] = 0.1;
            s.ground.slabs.back().material = soil;
        }
    }
    std::sort(s.ground.slabs.begin(), s.ground.slabs.end(), [&](const Slab& a, const Slab& b) {
        return permittivity(a.material, s.pulse.centre_frequency).value.real() <
               permittivity(b.material, s.pulse.centre_frequency).value.real();
    });
    const int host = static_cast<int>(from(0, layers));
    const double top = top_of(s.ground, host);
    const int count = 1 + static_cast<int>(from(0, 3));
    for (int i = 0; i < count; ++i) {
        const double x = 0.35 * i + from(-0.05, 0.05), depth = top + from(0.2, 0.22), radius = from(0.02, 0.1);
        RoundTarget t{x, depth, radius, constant_material(from(1, 30), 0.0), {}};
        if (chance(0.3)) t.inside = metal();
        if (dispersive && chance(0.2)) {
            t.inside = {};
            t.inside.model = Model::water;
            t.inside.inputs[Input::temperature] = 10.0;
            t.inside.inputs[Input::salinity] = 1.0;
        }
        if (chance(0.3)) t.wall = RoundTarget::Wall{0.3 * t.radius, constant_material(2.3, 0.0)};
        s.targets.push_back(t);
    }
    const double down = time_down(s.ground, top + 0.22, s.pulse.centre_frequency).value + s.height / speed_of_light;
    s.sampling = {-0.3, 0.2, 8, 0.0, 12.0 / s.pulse.centre_frequency + 2.0 * down, 160};
    return s;
}

}  // namespace gg
