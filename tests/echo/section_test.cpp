#include <doctest/doctest.h>

#include "echo/cylinder_functions.hpp"
#include "echo/scatterer.hpp"
#include "sections.hpp"

using namespace gg;

namespace {

constexpr Complex i1{0.0, 1.0};

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
            out[i] += 2.0 / T * (ricker_spectrum(f, fp) * sum * std::exp(i1 * (w * (p.start + i * dt)))).real();
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
    const double peak = peak_of(section.direct);
    // 2816 samples: the root mean square is good to 1/sqrt(2 * 2816) = 1.3 %, four times that allowed.
    CHECK(std::fabs(rms(section.noise) / (peak * 1e-3 / 2.0) - 1.0) < 0.054);
    CHECK(section_of(s).noise == section.noise);
}
