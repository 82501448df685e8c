#include "wave/plane_wave.hpp"

#include "near.hpp"

using namespace gg;
using namespace gg::test;

namespace {
constexpr double degree = pi / 180.0;
Complex concrete() { return permittivity(constant_material(5.24, 0.0462), 1e9).value; }
}  // namespace

TEST_CASE("speed and attenuation in a conducting medium are exact, not the low-loss form") {
    const auto rows = reference_table("exact_attenuation");
    REQUIRE(rows.size() == 4);
    for (const ReferenceRow& row : rows) {
        const PlaneWave wave = plane_wave(constant_material(row["K"], row["sigma"]), row["f"] * 1e6);
        CHECK(wave.attenuation_db() == printed(row["exact"]));
        CHECK(wave.speed == printed(row["v"] * 1e9));
        CHECK(low_loss_attenuation_db(row["sigma"], row["K"]) == printed(row["low_loss"]));
    }
    // Sea water of Davis & Annan's table: K 80, 3 S/m.
    CHECK(plane_wave(constant_material(80.0, 3.0), 1e8).attenuation_db() == printed(277.624));
    CHECK(plane_wave(constant_material(80.0, 3.0), 1e9).attenuation_db() == printed(522.524));
    CHECK(plane_wave(constant_material(80.0, 3.0), 1e8).speed == printed(0.0169567e9));
    CHECK(plane_wave(constant_material(80.0, 3.0), 1e9).speed == printed(0.0319147e9));
}

TEST_CASE("Davis and Annan 1989 table 1: low-loss attenuation at the ends, and a printed speed between them") {
    const auto rows = reference_table("davis_annan");
    REQUIRE(rows.size() == 13);
    for (const ReferenceRow& row : rows) {
        CAPTURE(row.text("material"));
        CHECK(low_loss_attenuation_db(row["sigma_low"] * 1e-3, row["K_low"]) == printed(row["loss_low"]));
        CHECK(low_loss_attenuation_db(row["sigma_high"] * 1e-3, row["K_high"]) == printed(row["loss_high"]));
        if (row.text("material") == "sea water") continue;  // its printed speed belongs to a frequency below 100 MHz
        const double fast = plane_wave(constant_material(row["K_low"], 0.0), 1e8).speed;
        const double slow = plane_wave(constant_material(row["K_high"], 0.0), 1e8).speed;
        CHECK(row["v"] * 1e9 < 1.08 * fast);  // the table rounds to one or two digits
        CHECK(row["v"] * 1e9 > 0.92 * slow);
    }
}

TEST_CASE("a wave's numbers hang together") {
    const double f = 4e8;
    const PlaneWave wave = plane_wave(constant_material(16.0, 0.05), f);
    CHECK(wave.wavelength * f == doctest::Approx(wave.speed));
    CHECK(wave.wavenumber.real() == doctest::Approx(2.0 * pi / wave.wavelength));
    CHECK(wave.wavenumber.imag() == doctest::Approx(-wave.attenuation));
    CHECK(wave.skin_depth * wave.attenuation == doctest::Approx(1.0));
    // impedance = w mu / k
    CHECK(std::abs(wave.impedance * wave.wavenumber / (2.0 * pi * f * vacuum_permeability) - 1.0) < 1e-9);
    CHECK(plane_wave(air(), f).speed == doctest::Approx(speed_of_light));
    CHECK(plane_wave(air(), f).skin_depth == 1e9);
    CHECK(plane_wave(air(), 0.0).issue == Issue::out_of_range);
    CHECK(plane_wave(air(), std::nan("")).issue == Issue::not_a_number);
    CHECK(std::isfinite(plane_wave(air(), std::nan("")).wavelength));
}

TEST_CASE("the wavenumber alone is that of the plane wave, with and without loss") {
    for (const double sigma : {0.0, 1e-9, 0.03, 10.0}) {
        for (const double f : {1e3, 4e8, 1e13}) {
            const Material material = constant_material(16.0, sigma);
            const Complex eps = permittivity(material, f).value, exact = 2.0 * pi * f / speed_of_light * std::sqrt(eps);
            CHECK(std::abs(wavenumber(material, f) - exact) < 1e-14 * std::abs(exact));
            CHECK(wavenumber(material, f) == plane_wave(material, f).wavenumber);
        }
    }
    // Loss beyond what its square can be written in.
    const Complex much = plane_wave(Permittivity{{1.0, -1e200}, Issue::none}, 1e6).wavenumber;
    CHECK(std::abs(much.imag() / much.real() + 1.0) < 1e-12);
}

TEST_CASE("Fresnel coefficients of the textbook table") {
    const auto rows = reference_table("fresnel");
    REQUIRE(rows.size() == 9);
    for (const ReferenceRow& row : rows) {
        CAPTURE(row["e1"]);
        CAPTURE(row["angle"]);
        const Fresnel r = fresnel(row["e1"], {row["e2"], -row["e2_loss"]}, row["angle"] * degree);
        const double digit = 1e-6;  // printed to six digits of values below 1
        CHECK(std::abs(r.te - Complex(row["te"], row["te_im"])) < digit);
        CHECK(std::abs(r.tm - Complex(row["tm"], row["tm_im"])) < digit);
    }
    CHECK(std::abs(fresnel(1.0, concrete(), 0.0).te) == printed(0.396459));
}

TEST_CASE("at the Brewster angle the magnetic-field coefficient is nothing, beyond the critical angle all returns") {
    const double pairs[][4] = {{1, 4, 63.4349, 90},  {1, 9, 71.5651, 90},       {9, 1, 18.4349, 19.4712},
                               {9, 16, 53.1301, 90}, {16, 9, 36.8699, 48.5904}, {25, 1, 11.3099, 11.5370},
                               {1, 81, 83.6598, 90}};
    for (const auto& [e1, e2, brewster, critical] : pairs) {
        CHECK(std::abs(fresnel(e1, e2, brewster * degree).tm) < 1e-4);  // angles are printed to 1e-4 degrees
        CHECK(std::atan(std::sqrt(e2 / e1)) / degree == printed(brewster));
        if (critical == 90) continue;
        CHECK(std::abs(fresnel(e1, e2, (critical + 0.01) * degree).te) == doctest::Approx(1.0).epsilon(1e-12));
        CHECK(std::abs(fresnel(e1, e2, (critical - 0.01) * degree).te) < 1.0);
    }
}

TEST_CASE("slabs of P.2040: 0.2 m of concrete and 0.03 m of wood at 1 GHz") {
    const SlabEcho straight = slab(1.0, concrete(), 1.0, 0.2, 1e9, 0.0);
    CHECK(std::abs(straight.reflection.te) == printed(0.327582));
    CHECK(std::abs(straight.transmission.te) == printed(0.407976));
    const SlabEcho slanted = slab(1.0, concrete(), 1.0, 0.2, 1e9, 45.0 * degree);
    CHECK(std::abs(slanted.reflection.te) == printed(0.449240));
    CHECK(std::abs(slanted.transmission.te) == printed(0.350208));
    CHECK(std::abs(slanted.reflection.tm) == printed(0.222664));
    CHECK(std::abs(slanted.transmission.tm) == printed(0.426290));
    const Complex wood = permittivity(constant_material(1.99, 0.0047), 1e9).value;
    const SlabEcho thin = slab(1.0, wood, 1.0, 0.03, 1e9, 0.0);
    CHECK(std::abs(thin.reflection.te) == printed(0.257734));
    CHECK(std::abs(thin.transmission.te) == printed(0.944113));
}

TEST_CASE("thin layers at normal incidence: an air gap in K 9, a film of water in K 6") {
    const auto gap = [](double d) { return std::abs(slab(9.0, 1.0, 9.0, d, 1e9, 0.0).reflection.te); };
    CHECK(gap(0.005) == printed(0.138130));
    CHECK(gap(0.010) == printed(0.267310));
    CHECK(gap(0.0749481) == printed(0.800000));
    const auto film = [](double d) { return std::abs(slab(6.0, 80.0, 6.0, d, 1e9, 0.0).reflection.te); };
    CHECK(film(0.001) == printed(0.300213));
    CHECK(film(0.00838) == printed(0.860465));
}

TEST_CASE("a lossless slab gives back all the power it does not pass") {
    for (const double below : {1.0, 4.0, 25.0}) {
        for (double angle = 0.0; angle < 1.5; angle += 0.1) {
            for (const double d : {0.01, 0.1, 0.77}) {
                const SlabEcho echo = slab(1.0, 6.0, below, d, 1e9, angle);
                const double cos1 = std::cos(angle), sin2 = std::sin(angle) * std::sin(angle);
                const double q3 = std::sqrt(below - sin2);
                CHECK(std::norm(echo.reflection.te) + std::norm(echo.transmission.te) * q3 / cos1 ==
                      doctest::Approx(1.0).epsilon(1e-12));
                CHECK(std::norm(echo.reflection.tm) + std::norm(echo.transmission.tm) * q3 / (below * cos1) ==
                      doctest::Approx(1.0).epsilon(1e-12));
            }
        }
    }
}

TEST_CASE("a slab of no thickness is the bare interface, and no input gives NaN") {
    const SlabEcho none = slab(4.0, 16.0, 9.0, 0.0, 5e8, 0.4);
    const Fresnel bare = fresnel(4.0, 9.0, 0.4);
    CHECK(std::abs(none.reflection.te - bare.te) < 1e-12);
    CHECK(std::abs(none.reflection.tm - bare.tm) < 1e-12);
    const double nan = std::nan("");
    CHECK(fresnel(1.0, 9.0, nan).te == Complex{});
    CHECK(slab(1.0, 9.0, 1.0, nan, 1e9, 0.0).reflection.te == Complex{});
    CHECK(std::isfinite(std::abs(fresnel(1.0, 1.0, pi / 2).te)));
    CHECK(std::abs(slab(1.0, concrete(), 1.0, 1e6, 1e9, 0.0).transmission.te) == 0.0);
}
