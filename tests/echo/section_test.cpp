#include <doctest/doctest.h>

#include <random>

#include "echo/cylinder_functions.hpp"
#include "echo/scatterer.hpp"
#include "echo/scene.hpp"

using namespace gg;

namespace {

constexpr Complex i1{0.0, 1.0};

Material metal() {
    Material m;
    m.model = Model::metal;
    return m;
}

double rms(const std::vector<double>& a) {
    double sum = 0.0;
    for (const double x : a) sum += x * x;
    return std::sqrt(sum / static_cast<double>(a.size()));
}
double apart(const std::vector<double>& a, const std::vector<double>& b) {
    REQUIRE(a.size() == b.size());
    std::vector<double> d(a.size());
    for (std::size_t i = 0; i < a.size(); ++i) d[i] = a[i] - b[i];
    return rms(d) / rms(b);
}
std::vector<double> trace_of(const Section& s, int trace) {
    return {s.targets.begin() + trace * s.samples, s.targets.begin() + (trace + 1) * s.samples};
}

/// Three layers, two different targets in the second.
Scene two_pipes() {
    Scene s;
    s.pulse.centre_frequency = 400e6;
    s.separation = 0.16;
    s.ground.slabs = {
        {constant_material(5, 0.002), 0.4}, {constant_material(9, 0.005), 1.0}, {constant_material(15, 0.01), 0}};
    s.targets = {{0.3, 0.9, 0.055, constant_material(80, 0.05), {}}, {0.7, 0.8, 0.08, metal(), {}}};
    s.sampling = {0.0, 0.1, 11, 0.0, 40e-9, 256};
    return s;
}

Scene random_scene(std::mt19937& random) {
    const auto between = [&](double low, double high) {
        return std::uniform_real_distribution<double>(low, high)(random);
    };
    Scene s;
    s.pulse.centre_frequency = between(200e6, 900e6);
    s.polarisation = between(0, 1) < 0.5 ? Polarisation::along : Polarisation::across;
    s.separation = between(0, 1) < 0.2 ? 0.0 : between(0.02, 0.4);
    s.height = between(0, 1) < 0.5 ? 0.0 : between(0.0, 0.3);
    const int layers = 1 + static_cast<int>(between(0, 3));
    for (int i = 0; i < layers; ++i)
        s.ground.slabs.push_back({constant_material(between(3, 20), between(0, 0.01)), between(0.3, 0.8)});
    const int host = static_cast<int>(between(0, layers));
    const double top = top_of(s.ground, host);
    const int count = 1 + static_cast<int>(between(0, 3));
    for (int i = 0; i < count; ++i) {
        RoundTarget t{0.35 * i + between(-0.05, 0.05),
                      top + between(0.14, 0.16),
                      between(0.02, 0.1),
                      constant_material(between(1, 30), 0.0),
                      {}};
        if (between(0, 1) < 0.3) t.inside = metal();
        if (between(0, 1) < 0.3) t.wall = RoundTarget::Wall{0.3 * t.radius, constant_material(2.3, 0.0)};
        s.targets.push_back(t);
    }
    const double down = time_down(s.ground, top + 0.16, s.pulse.centre_frequency).value + s.height / speed_of_light;
    s.sampling = {-0.3, 0.2, 8, 0.0, 12.0 / s.pulse.centre_frequency + 2.0 * down, 160};
    return s;
}

/// Spectrum per hertz of a Ricker pulse of peak 1: closed form, 2/(sqrt(pi) fp) (f/fp)^2 exp(-(f/fp)^2).
double ricker(double f, double fp) {
    return f * f / (fp * fp * fp) * std::exp(-f * f / (fp * fp)) / (0.5 * std::sqrt(pi));
}

/// The echo of one target in air everywhere, from the closed form with Hankel functions about the target at real
/// frequencies: no layers, no kx, no damping.
std::vector<double> in_the_open(const Scene& s, double x) {
    const Sampling& p = s.sampling;
    const RoundTarget& t = s.targets[0];
    const double dt = p.window / p.samples, T = 16.0 * p.window, fp = s.pulse.centre_frequency;
    const double z = -(t.depth + s.height), x1 = x - s.separation / 2 - t.x, x2 = x + s.separation / 2 - t.x;
    const double r1 = std::hypot(x1, z), r2 = std::hypot(x2, z), angle1 = std::atan2(z, x1), angle2 = std::atan2(z, x2);
    std::vector<double> out(static_cast<std::size_t>(p.samples), 0.0);
    constexpr int most = 14;
    for (int k = 1; k / T < 4.5 * fp; ++k) {
        const double f = k / T, w = 2 * pi * f, k0 = w / speed_of_light;
        Inner inside{true, {}, {}};
        if (t.inside.model != Model::metal) {
            const Complex eps = permittivity(t.inside, f).value;
            inside = {false, k0 * std::sqrt(eps), eps};
        }
        const auto s_n = scatter({t.radius, inside, 0.0, {}}, {false, k0, 1.0}, most, s.polarisation);
        const CylinderFunctions h1 = cylinder_functions(k0 * r1, most), h2 = cylinder_functions(k0 * r2, most);
        // d/dz of H_n(k r) exp(-jn angle): what a horizontal current's magnetic field is made of.
        const auto slope = [&](const CylinderFunctions& h, double r, double angle, int n) {
            const int m = std::abs(n);
            const double sign = n < 0 && (m & 1) ? -1.0 : 1.0;
            return sign * (k0 * h.h_slope(m) * std::sin(angle) - i1 * (n * std::cos(angle) / r) * h.h[m]) *
                   std::exp(-i1 * (n * angle));
        };
        Complex sum = 0.0;
        for (int n = -most; n <= most; ++n) {
            const int m = std::abs(n);
            if (s.polarisation == Polarisation::along) {
                sum += -(w * vacuum_permeability / 4.0) * s_n[m] * h1.h[m] * h2.h[m] *
                       std::exp(i1 * (n * (angle2 - angle1)));
            } else {
                sum += ((m & 1) ? -1.0 : 1.0) * s_n[m] * slope(h1, r1, angle1, n) * slope(h2, r2, angle2, -n) * -0.25 /
                       (w * vacuum_permittivity);
            }
        }
        for (int i = 0; i < p.samples; ++i)
            out[i] += 2.0 / T * (ricker(f, fp) * sum * std::exp(i1 * (w * (p.start + i * dt)))).real();
    }
    return out;
}

}  // namespace

TEST_CASE("One target in the open answers as the closed form says, in both polarisations") {
    Scene s;
    s.ground.slabs = {{air(), 0.0}};
    s.pulse.centre_frequency = 400e6;
    s.separation = 0.16;
    s.height = 0.1;
    s.sampling = {0.1, 0.3, 3, 0.0, 20e-9, 256};
    for (const Polarisation polarisation : {Polarisation::along, Polarisation::across}) {
        for (const Material& inside : {metal(), constant_material(4, 0.0), constant_material(30, 0.2)}) {
            s.polarisation = polarisation;
            s.targets = {{0.0, 0.7, 0.1, inside, {}}};
            const Section section = section_of(s);
            for (int i = 0; i < 3; ++i) {
                // Air all round and no loss is the engine's worst case: what comes after the period wraps round damped
                // by exp(-6) = 0.25 %.
                CHECK(apart(trace_of(section, i), in_the_open(s, 0.1 + 0.3 * i)) < 5e-3);
            }
        }
    }
}

TEST_CASE("Tighter cut-offs do not change the section") {
    Scene s = two_pipes();
    for (const Polarisation polarisation : {Polarisation::along, Polarisation::across}) {
        s.polarisation = polarisation;
        const Section plain = section_of(s), careful = section_of(s, 4.0);
        CHECK(apart(plain.targets, careful.targets) < 2e-3);
        CHECK(apart(plain.layers, careful.layers) < 2e-3);
        CHECK(apart(plain.direct, careful.direct) < 1e-3);
    }
}

TEST_CASE("A mirrored line records the mirrored section: geometry and reciprocity") {
    // Mirrored, transmitter and receiver change places as well, so this holds only for a reciprocal engine.
    std::mt19937 random(7);
    for (int i = 0; i < 12; ++i) {
        const Scene s = random_scene(random);
        REQUIRE(fault_of(s) == "");
        Scene m = s;
        for (RoundTarget& t : m.targets) t.x = -t.x;
        m.sampling.first = -(s.sampling.first + s.sampling.step * (s.sampling.traces - 1));
        const Section a = section_of(s), b = section_of(m);
        std::vector<double> turned;
        for (int t = b.traces - 1; t >= 0; --t) {
            const std::vector<double> trace = trace_of(b, t);
            turned.insert(turned.end(), trace.begin(), trace.end());
        }
        CAPTURE(i);
        CHECK(rms(a.targets) > 0.0);
        CHECK(apart(a.targets, turned) < 2e-3);
    }
}

TEST_CASE("Nothing arrives before the fastest way to a target and back") {
    std::mt19937 random(8);
    for (int i = 0; i < 12; ++i) {
        Scene s = random_scene(random);
        const Section section = section_of(s);
        double peak = 0.0;
        for (const double v : section.targets) peak = std::max(peak, std::fabs(v));
        const double lead = 1.3 / s.pulse.centre_frequency;  // a Ricker pulse's own rise, from 1e-6 of its peak
        for (int trace = 0; trace < section.traces; ++trace) {
            double first = 1e9;
            for (const RoundTarget& t : s.targets) {
                double way = 0.0;
                for (int leg = 0; leg < 2; ++leg) {
                    // No refracted path is shorter than each layer's thickness crossed upright.
                    way += s.height / speed_of_light;
                    const int host = layer_at(s.ground, t.depth);
                    for (int l = 0; l <= host; ++l) {
                        const double thickness =
                            l < host ? s.ground.slabs[l].thickness : t.depth - t.radius - top_of(s.ground, host);
                        way += thickness * std::sqrt(s.ground.slabs[l].material.inputs[Input::permittivity]) /
                               speed_of_light;
                    }
                }
                first = std::min(first, way);
            }
            for (int k = 0; k < section.samples && k * section.dt < first - lead; ++k) {
                CAPTURE(i);
                CAPTURE(k);
                CHECK(std::fabs(section.at(trace, k)) < 3e-3 * peak);
            }
        }
    }
}

TEST_CASE("A later start shows the same trace later, a longer window the same trace and more") {
    const Scene s = two_pipes();
    const Section a = section_of(s);
    Scene later = s;
    const int skip = 40;
    later.sampling.start = skip * a.dt;
    later.sampling.samples -= skip;
    later.sampling.window -= skip * a.dt;
    const Section b = section_of(later);
    Scene longer = s;
    longer.sampling.samples *= 2;
    longer.sampling.window *= 2;
    const Section c = section_of(longer);
    for (int trace = 0; trace < a.traces; ++trace) {
        const std::vector<double> plain = trace_of(a, trace), more = trace_of(c, trace);
        CHECK(apart(trace_of(b, trace), {plain.begin() + skip, plain.end()}) < 2e-3);
        CHECK(apart(plain, {more.begin(), more.begin() + a.samples}) < 3e-3);
    }
}

TEST_CASE("Too few samples fold: they are every other sample of twice as many") {
    Scene s = two_pipes();
    s.sampling.samples = 32;  // 0.8 GHz: half of what the 400 MHz pulse holds
    Scene fine = s;
    fine.sampling.samples = 256;
    const Section coarse = section_of(s), whole = section_of(fine);
    std::vector<double> picked;
    for (std::size_t i = 0; i < whole.targets.size(); i += 8) picked.push_back(whole.targets[i]);
    CHECK(apart(coarse.targets, picked) < 2e-3);
}

TEST_CASE("Targets of the ground's own stuff are silent, others are not") {
    Scene s = two_pipes();
    for (RoundTarget& t : s.targets) t.inside = s.ground.slabs[1].material;
    const Section none = section_of(s);
    CHECK(rms(none.targets) < 1e-9 * rms(none.direct));
    CHECK(rms(section_of(two_pipes()).targets) > 1e-3 * rms(none.direct));
}

TEST_CASE("Boundaries between equal layers change nothing, and send nothing back") {
    Scene s = two_pipes();
    for (Slab& slab : s.ground.slabs) slab.material = constant_material(9, 0.005);
    Scene plain = s;
    plain.ground.slabs = {{constant_material(9, 0.005), 0.0}};
    const Section a = section_of(s), b = section_of(plain);
    CHECK(apart(a.targets, b.targets) < 2e-3);
    CHECK(rms(a.layers) < 1e-9 * rms(a.direct));
}

TEST_CASE("Scenes that make no sense are refused with a sentence") {
    const auto refuses = [](const auto& change, const char* word) {
        Scene s = two_pipes();
        change(s);
        const Section section = section_of(s);
        CAPTURE(section.reason);
        CHECK(!section.ok());
        CHECK(section.targets.empty());
        CHECK(section.reason.find(word) != std::string::npos);
    };
    CHECK(section_of(two_pipes()).ok());
    refuses([](Scene& s) { s.targets[0].depth = 0.42; }, "straddles");
    refuses([](Scene& s) { s.targets[0].depth = 1.38; }, "straddles");
    refuses([](Scene& s) { s.targets[0].depth = 0.05; }, "surface");
    refuses([](Scene& s) { s.targets[1].x = 0.35; }, "touch");
    refuses([](Scene& s) { s.targets[1].depth = 0.2; }, "same layer");
    refuses([](Scene& s) { s.targets.resize(7, s.targets[0]); }, "six");
    refuses([](Scene& s) { s.targets[0].radius = std::nan(""); }, "radius");
    refuses([](Scene& s) { s.sampling.step = 0.0; }, "step");
    refuses([](Scene& s) { s.ground.slabs.clear(); }, "layer");
    refuses([](Scene& s) { s.targets[0].wall = RoundTarget::Wall{0.06, air()}; }, "wall");
}

TEST_CASE("Noise has the level the dynamic range and the stacks leave, and repeats with its seed") {
    Scene s = two_pipes();
    s.noise = {60.0, 4, 9};
    const Section section = section_of(s);
    double peak = 0.0;
    for (const double v : section.direct) peak = std::max(peak, std::fabs(v));
    // 2816 samples: the root mean square is good to 1/sqrt(2 * 2816) = 1.3 %, four times that allowed.
    CHECK(std::fabs(rms(section.noise) / (peak * 1e-3 / 2.0) - 1.0) < 0.054);
    CHECK(section_of(s).noise == section.noise);
}
