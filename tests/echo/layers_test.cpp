#include <doctest/doctest.h>

#include "echo/cylinder_functions.hpp"
#include "echo/direct.hpp"
#include "echo/spectra.hpp"
#include "sections.hpp"

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

/// A plane wave's field at the antennas sent back by everything below, over what it was there: a chain of transmission
/// lines, wave impedance by wave impedance from below. Another way than the engine's, good past grazing too.
/// @param layers  how many of the ground's layers there are; the last of them goes down without end
Complex sent_back(const Media& media, const Stack& ground, std::size_t layers, Complex kx, Polarisation polarisation) {
    const auto upright = [&](std::size_t i) {
        const Complex k = media.ground[i].k, kz = std::sqrt(k * k - kx * kx);
        return kz.imag() > 0.0 ? -kz : kz;
    };
    const auto impedance = [&](std::size_t i) {
        return polarisation == Polarisation::along
                   ? media.w * vacuum_permeability / upright(i)
                   : upright(i) / (media.w * vacuum_permittivity * media.ground[i].permittivity);
    };
    Complex load = impedance(layers);
    for (std::size_t i = layers - 1; i > 0; --i) {
        const Complex own = impedance(i), turn = i1 * std::tan(upright(i) * ground.slabs[i - 1].thickness);
        load = own * (load + own * turn) / (own + load * turn);
    }
    return (load - impedance(0)) / (load + impedance(0));
}

/// The same for a line source: -1/(4 pi) times the integral over kx of (impedance of air) (sent back) exp(-2 j kz h -
/// j kx s), with kx = k0 sin(angle) and past grazing k0 cosh(u), which take the root at grazing out.
/// @param back  of kx
template <class Back>
Complex line_integral(Complex w, double separation, double height, Polarisation polarisation, const Back& back) {
    const Complex k0 = w / speed_of_light;
    const bool along = polarisation == Polarisation::along;
    const double wave_impedance = vacuum_permeability * speed_of_light;
    const auto at = [&](Complex kx, Complex kz, Complex slope) {
        // Impedance times dkx: slope is dkx / kz.
        const Complex weight = along ? wave_impedance * k0 * slope : wave_impedance / k0 * kz * kz * slope;
        return 2.0 * std::cos(kx * separation) * std::exp(-2.0 * i1 * kz * height) * weight * back(kx);
    };
    constexpr int steps = 600;
    const double end = std::asinh(16.0 / (2.0 * height * std::abs(k0)));
    Complex sum;
    for (int i = 0; i < steps; ++i) {  // midpoints
        const double angle = (i + 0.5) / steps * pi / 2.0, u = (i + 0.5) / steps * end;
        sum += pi / 2.0 / steps * at(k0 * std::sin(angle), k0 * std::cos(angle), 1.0);
        sum += end / steps * at(k0 * std::cosh(u), -i1 * k0 * std::sinh(u), i1);
    }
    return -sum / (4.0 * pi);
}

}  // namespace

TEST_CASE("The layers' reflection of one plane wave is the exact one of a slab, in both polarisations") {
    // The second implementation is wave's slab(), itself checked against published values; kx = k0 sin(angle).
    Scene s = slab_scene();
    s.ground.slabs.erase(s.ground.slabs.begin());
    const double f = 0.8e9;
    const Media media = media_at(s, 2 * pi * f, 1e-3);
    for (const double angle : {0.0, 0.2, 0.7, 1.2, 1.5}) {
        const double kx = media.ground[0].k.real() * std::sin(angle);
        const SlabEcho exact = slab(1.0, media.ground[1].permittivity, media.ground[2].permittivity, 0.05, f, angle);
        for (const bool along : {true, false}) {
            PlaneWaves waves(media, s.ground, along ? Polarisation::along : Polarisation::across);
            waves.turn_to(kx);
            const Complex ours = waves.D[0];
            // Across is reckoned in the magnetic field, as wave's tm is.
            CHECK(std::abs(ours - (along ? exact.reflection.te : exact.reflection.tm)) < 1e-6);
        }
    }
}

TEST_CASE("The layers' reflection is that of a chain of transmission lines, past grazing too") {
    const Scene s = slab_scene();
    for (const double f : {0.2e9, 0.8e9, 2e9}) {
        const Media media = media_at(s, 2 * pi * f, 1e7);
        for (const double slope : {0.0, 0.5, 0.95, 1.05, 1.3, 2.0, 3.0, 5.0}) {  // of the air's wave number
            const double kx = slope * media.ground[0].k.real();
            for (const bool along : {true, false}) {
                const Polarisation polarisation = along ? Polarisation::along : Polarisation::across;
                PlaneWaves waves(media, s.ground, polarisation);
                waves.turn_to(kx);
                // Theirs is of the electric field along the surface, the engine's across of the magnetic one.
                const Complex exact = (along ? 1.0 : -1.0) * sent_back(media, s.ground, 3, kx, polarisation);
                CAPTURE(slope);
                CHECK(std::abs(Complex(waves.D[0]) - exact) < 1e-9 * std::max(1.0, std::abs(exact)));
            }
        }
    }
}

TEST_CASE("The layers' own echo is the sum of exact plane-wave echoes of the slab over every slope") {
    Scene s = slab_scene();
    s.height = 0.06;
    s.sampling = {0.0, 0.1, 1, 0.0, 12e-9, 256};
    for (const Polarisation polarisation : {Polarisation::along, Polarisation::across}) {
        for (const double separation : {0.0, 0.3}) {
            s.polarisation = polarisation;
            s.separation = separation;
            const Section section = section_of(s);
            constexpr double T = 60e-9;
            std::vector<double> expected(section.layers.size(), 0.0);
            for (int k = 1; k / T < 4.5e9; ++k) {
                const double f = k / T, w = 2 * pi * f;
                const Media media = media_at(s, w, 1e-3);
                const Complex value = ricker_spectrum(f, 1e9) *
                                      line_integral(media.w, separation, s.height, polarisation, [&](Complex kx) {
                                          return sent_back(media, s.ground, 3, kx, polarisation) -
                                                 sent_back(media, s.ground, 1, kx, polarisation);
                                      });
                for (std::size_t i = 0; i < expected.size(); ++i)
                    expected[i] += 2.0 / T * (value * std::exp(i1 * (w * static_cast<double>(i) * section.dt))).real();
            }
            CAPTURE(separation);
            CHECK(apart(section.layers, expected) < 2e-3);
        }
    }
}

TEST_CASE("Lifted off the ground the direct wave is the free one and the surface's share, in both polarisations") {
    Scene s = slab_scene();
    for (const Polarisation polarisation : {Polarisation::along, Polarisation::across}) {
        for (const double f : {0.3e9, 1e9, 2.5e9}) {
            const Media media = media_at(s, 2 * pi * f, 1e6);
            const Complex k = media.ground[0].k;
            for (const double separation : {0.05, 0.3}) {
                const CylinderFunctions h = cylinder_functions(k * separation, 1);
                const Complex free = polarisation == Polarisation::along
                                         ? -media.w * vacuum_permeability / 4.0 * h.h[0]
                                         : -k * h.h[1] / (4.0 * media.w * vacuum_permittivity * separation);
                const Complex surface = line_integral(media.w, separation, 0.05, polarisation, [&](Complex kx) {
                    return sent_back(media, s.ground, 1, kx, polarisation);
                });
                CHECK(std::abs(direct_wave(media, separation, 0.05, polarisation) - free - surface) <
                      1e-4 * std::abs(free));
            }
        }
    }
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
