#include <doctest/doctest.h>

#include "echo/cylinder_functions.hpp"
#include "echo/direct.hpp"
#include "echo/spectra.hpp"

using namespace gg;

namespace {

constexpr Complex i1{0.0, 1.0};

Scene slab_scene() {
    Scene s;
    s.pulse.centre_frequency = 1e9;
    s.ground.slabs = {
        {constant_material(6, 0.01), 0.2}, {constant_material(2, 0.0), 0.05}, {constant_material(12, 0.03), 0.0}};
    s.sampling = {0.0, 0.1, 1, 0.0, 30e-9, 512};
    return s;
}

double ricker(double f, double fp) {
    return f * f / (fp * fp * fp) * std::exp(-f * f / (fp * fp)) / (0.5 * std::sqrt(pi));
}

}  // namespace

TEST_CASE(
    "The layers' reflection of one plane wave is the exact one of a slab, in both polarisations, past grazing too") {
    // The second implementation is wave's slab(), itself checked against published values; kx = k0 sin(angle).
    Scene s = slab_scene();
    s.ground.slabs.erase(s.ground.slabs.begin());
    const double f = 0.8e9;
    const Media media = media_at(s, 2 * pi * f, 1e-3);
    for (const double angle : {0.0, 0.2, 0.7, 1.2, 1.5}) {
        const double kx = media.ground[0].k.real() * std::sin(angle);
        const SlabEcho exact = slab(1.0, media.ground[1].permittivity, media.ground[2].permittivity, 0.05, f, angle);
        for (const bool along : {true, false}) {
            const Spectra spectra =
                spectra_of(media, s.ground, {1, 0.0, 0.05}, 0.0, along ? Polarisation::along : Polarisation::across,
                           std::max(kx, 1e-9), 2);
            const Complex ours = Complex(spectra.surface[1]) + Complex(spectra.echo[1]);
            // Across is reckoned in the magnetic field, as wave's tm is.
            CHECK(std::abs(ours - (along ? exact.reflection.te : exact.reflection.tm)) < 1e-6);
        }
    }
}

TEST_CASE(
    "From high above, the layers' echo is the free wave of the mirrored source times the exact reflection straight "
    "down") {
    Scene s = slab_scene();
    s.height = 3.0;
    s.sampling.start = 17e-9;
    const Section section = section_of(s);
    const double T = 200e-9, dt = section.dt;
    std::vector<double> expected(section.layers.size(), 0.0);
    for (int k = 1; k / T < 4.5e9; ++k) {
        const double f = k / T, w = 2 * pi * f;
        const Complex e0 = permittivity(s.ground.slabs[0].material, f).value,
                      e1 = permittivity(s.ground.slabs[1].material, f).value,
                      e2 = permittivity(s.ground.slabs[2].material, f).value;
        const SlabEcho lower = slab(e0, e1, e2, 0.05, f, 0.0);
        const Complex r = fresnel(1.0, e0, 0.0).te,
                      turn = lower.reflection.te * std::exp(-2.0 * i1 * (w / speed_of_light * std::sqrt(e0) * 0.2));
        const Complex whole = (r + turn) / (1.0 + r * turn);
        const CylinderFunctions h = cylinder_functions(w / speed_of_light * 6.0, 0);
        const Complex value = ricker(f, 1e9) * -(w * vacuum_permeability / 4.0) * h.h[0] * (whole - r);
        for (std::size_t i = 0; i < expected.size(); ++i)
            expected[i] +=
                2.0 / T * (value * std::exp(i1 * (w * (section.start + static_cast<double>(i) * dt)))).real();
    }
    double off = 0.0, all = 0.0;
    for (std::size_t i = 0; i < expected.size(); ++i) {
        off += (expected[i] - section.layers[i]) * (expected[i] - section.layers[i]);
        all += expected[i] * expected[i];
    }
    CHECK(all > 0.0);
    // The path in the ground is 0.5 m of a mirrored 6 m and bends by Snell: spreading differs by depth/(n height), some
    // 2 %.
    CHECK(std::sqrt(off / all) < 0.04);
}

TEST_CASE("On the ground the direct wave of a line current is the closed form of two Hankel functions") {
    // E = -(w mu0 / 2) (k0 H1(k0 s) - k1 H1(k1 s)) / (s (k0^2 - k1^2)), from int kz exp(-j kx s) dkx = pi k H1(k s) /
    // s.
    Scene s = slab_scene();
    for (const double f : {0.1e9, 1e9, 3e9}) {
        const Media media = media_at(s, 2 * pi * f, 1e6);
        const Complex k0 = media.ground[0].k, k1 = media.ground[1].k;
        for (const double apart : {0.02, 0.1, 0.5}) {
            const CylinderFunctions h0 = cylinder_functions(k0 * apart, 1), h1 = cylinder_functions(k1 * apart, 1);
            const Complex closed =
                -media.w * vacuum_permeability / 2.0 * (k0 * h0.h[1] - k1 * h1.h[1]) / (apart * (k0 * k0 - k1 * k1));
            const Complex free = media.w * vacuum_permeability / 4.0 * h0.h[0];
            CHECK(std::abs(direct_wave(media, apart, 0.0, Polarisation::along) - closed) < 1e-5 * std::abs(free));
        }
    }
}

TEST_CASE("Over ground that is air the direct wave is the free wave, in both polarisations") {
    Scene s = slab_scene();
    s.ground.slabs = {{air(), 0.0}};
    const Media media = media_at(s, 2 * pi * 1e9, 1e6);
    const Complex k = media.ground[0].k;
    for (const double apart : {0.05, 0.4}) {
        const CylinderFunctions h = cylinder_functions(k * apart, 1);
        const Complex along = -media.w * vacuum_permeability / 4.0 * h.h[0];
        // E_x of a current element along x, beside it: only the field along the line of the two, -k H1 / (4 w eps0 s).
        const Complex across = -k * h.h[1] / (4.0 * media.w * vacuum_permittivity * apart);
        CHECK(std::abs(direct_wave(media, apart, 0.0, Polarisation::along) / along - 1.0) < 1e-6);
        CHECK(std::abs(direct_wave(media, apart, 0.2, Polarisation::across) / across - 1.0) < 1e-6);
    }
}
