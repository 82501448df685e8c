#include "echo/scatterer.hpp"

#include <doctest/doctest.h>

#include "echo/coupling.hpp"

using namespace gg;

namespace {

constexpr Complex i1{0.0, 1.0};

/// Widths and efficiencies of one cylinder in a host of wave number 1 from its s_n = -c_n.
struct Widths {
    std::vector<Complex> s;
    double x;
    Widths(double ka, Complex ratio, bool metal, Polarisation polarisation) : x(ka) {
        const Inner inside{metal, std::sqrt(ratio), ratio};
        s = scatter({ka, inside, 0.0, {}}, {false, 1.0, 1.0}, static_cast<int>(ka + 4.0 * std::cbrt(ka) + 12.0),
                    polarisation);
    }
    /// sigma_2D / wavelength at a scattering angle, 0 forward.
    double width(double angle) const {
        Complex sum = s[0];
        for (std::size_t n = 1; n < s.size(); ++n) sum += 2.0 * s[n] * std::cos(static_cast<double>(n) * angle);
        return 2.0 / pi * std::norm(sum);
    }
    double scattered() const {
        double sum = std::norm(s[0]);
        for (std::size_t n = 1; n < s.size(); ++n) sum += 2.0 * std::norm(s[n]);
        return 2.0 / x * sum;
    }
    double lost() const {
        double sum = -s[0].real();
        for (std::size_t n = 1; n < s.size(); ++n) sum -= 2.0 * s[n].real();
        return 2.0 / x * sum;
    }
};

/// Half a unit of the sixth digit.
bool six_digits(double value, double printed) { return std::fabs(value - printed) <= 0.6e-5 * std::fabs(printed); }

}  // namespace

TEST_CASE("A metal cylinder has the published widths in both polarisations") {
    // Series of Harrington 1961 ch. 5, Ruck et al. 1970 ch. 4 (titles from memory); sigma_2D/lambda to six digits by
    // scipy.
    struct Row {
        double ka, along_back, across_back, along_side, across_side, along_forward, across_forward;
    };
    const Row rows[] = {
        {0.05, 0.127333, 2.20779e-5, 0.129326, 2.43389e-6, 0.131341, 2.50421e-6},
        {0.1, 0.180271, 3.51880e-4, 0.189138, 3.82458e-5, 0.198356, 4.16588e-5},
        {0.2, 0.253847, 0.00549853, 0.290171, 5.81940e-4, 0.331842, 7.29902e-4},
        {0.5, 0.375439, 0.160285, 0.514437, 0.0192987, 0.810374, 0.0315374},
        {1, 0.614760, 0.544802, 0.648455, 0.256803, 1.89188, 0.261844},
        {2, 1.08736, 1.11978, 0.993899, 0.765790, 5.12390, 1.44452},
        {10, 5.02798, 4.87397, 3.76408, 4.04693, 80.1874, 52.6943},
    };
    for (const Row& row : rows) {
        CAPTURE(row.ka);
        const Widths along(row.ka, 1.0, true, Polarisation::along), across(row.ka, 1.0, true, Polarisation::across);
        CHECK(six_digits(along.width(pi), row.along_back));
        CHECK(six_digits(across.width(pi), row.across_back));
        CHECK(six_digits(along.width(pi / 2), row.along_side));
        CHECK(six_digits(across.width(pi / 2), row.across_side));
        CHECK(six_digits(along.width(0), row.along_forward));
        CHECK(six_digits(across.width(0), row.across_forward));
    }
    const double scattered[][3] = {{0.1, 5.94470, 0.00369160}, {1, 2.95656, 1.00019}, {10, 2.21332, 1.79662}};
    for (const auto& row : scattered) {
        CHECK(six_digits(Widths(row[0], 1.0, true, Polarisation::along).scattered(), row[1]));
        CHECK(six_digits(Widths(row[0], 1.0, true, Polarisation::across).scattered(), row[2]));
    }
}

TEST_CASE("A filled cylinder has the widths of its series in both polarisations") {
    // Bohren & Huffman 1983 section 8.4 (from memory); ratios: 4; plastic 2.3, air 1 and water 80 in soil 9.
    struct Row {
        double ratio, ka, along_back, along_forward, along_q, across_back, across_forward, across_q;
    };
    const Row rows[] = {
        {4, 0.1, 3.79447e-4, 3.83130e-4, 0.0119785, 5.66776e-5, 5.76749e-5, 8.98123e-4},
        {4, 0.5, 0.249873, 0.302601, 1.73073, 0.0281671, 0.0449180, 0.114976},
        {4, 1, 0.267949, 2.26938, 2.86293, 0.0176663, 1.26017, 1.16319},
        {4, 2, 0.677340, 13.1267, 4.29323, 1.19669, 8.74188, 3.69888},
        {2.3 / 9, 0.1, 2.11244e-5, 2.13388e-5, 6.67007e-4, 5.38674e-5, 5.43109e-5, 8.49628e-4},
        {2.3 / 9, 0.5, 0.00867264, 0.0113517, 0.0626743, 0.0235174, 0.0291952, 0.0826627},
        {2.3 / 9, 1, 0.0566919, 0.159697, 0.320806, 0.172515, 0.400761, 0.438554},
        {1.0 / 9, 0.2, 4.44917e-4, 4.63664e-4, 0.00713535, 0.00145821, 0.00150563, 0.0116385},
        {1.0 / 9, 1, 0.0751513, 0.209889, 0.422117, 0.289233, 0.643154, 0.713496},
        {1.0 / 9, 2, 0.244767, 2.31905, 1.36803, 0.867613, 6.27279, 2.31440},
        {80.0 / 9, 0.1, 0.00300756, 0.00303499, 0.0949158, 1.00106e-4, 1.03131e-4, 0.00159626},
        {80.0 / 9, 0.5, 0.633268, 0.667210, 4.04219, 0.0375203, 0.106196, 0.233561},
        {80.0 / 9, 1, 0.668113, 3.30240, 4.12117, 1.15570, 1.42764, 2.69742},
    };
    for (const Row& row : rows) {
        CAPTURE(row.ratio);
        CAPTURE(row.ka);
        const Widths along(row.ka, row.ratio, false, Polarisation::along),
            across(row.ka, row.ratio, false, Polarisation::across);
        CHECK(six_digits(along.width(pi), row.along_back));
        CHECK(six_digits(along.width(0), row.along_forward));
        CHECK(six_digits(along.scattered(), row.along_q));
        CHECK(six_digits(across.width(pi), row.across_back));
        CHECK(six_digits(across.width(0), row.across_forward));
        CHECK(six_digits(across.scattered(), row.across_q));
    }
    const Widths along(1, {4, -1}, false, Polarisation::along), across(1, {4, -1}, false, Polarisation::across);
    CHECK(six_digits(along.width(pi), 0.0247610));
    CHECK(six_digits(along.scattered(), 1.96942));
    CHECK(six_digits(along.lost(), 2.99088));
    CHECK(six_digits(across.width(pi), 0.0746402));
    CHECK(six_digits(across.scattered(), 0.893196));
    CHECK(six_digits(across.lost(), 1.52617));
}

TEST_CASE("Thin cylinders scatter as the closed forms without a series say, bare, filled and walled") {
    // Metal: Ruck et al. 1970, equations 4.1-19 and 4.1-22, as widths over the radius.
    constexpr double x = 0.002;
    const Widths bar(x, 1.0, true, Polarisation::along), turned(x, 1.0, true, Polarisation::across);
    const double log = std::log(0.8905 * x);
    CHECK(std::fabs(bar.width(pi) * 2.0 * pi / x / (pi * pi / (x * (log * log + pi * pi / 4.0))) - 1.0) < 1e-4);
    CHECK(std::fabs(turned.width(pi) * 2.0 * pi / x / (pi * pi * x * x * x * 2.25) - 1.0) < 1e-4);
    CHECK(std::fabs(turned.width(0) * 2.0 * pi / x / (pi * pi * x * x * x * 0.25) - 1.0) < 1e-4);
    // Filled and walled: along the field what counts is the sum of area times contrast; across it the polarisability of
    // the two rings in a static field (textbook; derived from continuity of potential and displacement).
    const Inner host{false, 1.0, 1.0};
    const auto matter = [](Complex eps) { return Inner{false, std::sqrt(eps), eps}; };
    const double share = 0.64;  // of the area inside the wall
    for (const Complex inside : {Complex{4.0}, Complex{0.2}, Complex{9.0, -3.0}}) {
        for (const Complex wall : {Complex{0.3}, Complex{2.0, -0.5}}) {
            const Cylinder c{x, matter(inside), x * (1.0 - std::sqrt(share)), matter(wall)};
            const Complex mean = share * inside + (1.0 - share) * wall;
            const Complex along = -i1 * pi / 4.0 * x * x * (mean - 1.0);
            CHECK(std::abs(scatter(c, host, 2, Polarisation::along)[0] / along - 1.0) < 1e-4);
            const Complex whole = wall * (inside * (1.0 + share) + wall * (1.0 - share)) /
                                  (inside * (1.0 - share) + wall * (1.0 + share));
            const Complex across = -i1 * pi / 4.0 * x * x * (whole - 1.0) / (whole + 1.0);
            CHECK(std::abs(scatter(c, host, 2, Polarisation::across)[1] / across - 1.0) < 1e-4);
        }
    }
    const Cylinder sleeved{x, {true, {}, {}}, x * (1.0 - std::sqrt(share)), matter(0.3)};
    const double whole = 0.3 * (1.0 + share) / (1.0 - share);
    const Complex across = -i1 * pi / 4.0 * x * x * ((whole - 1.0) / (whole + 1.0));
    // A metal core also keeps the magnetic field out, which is of the same order but of another n.
    CHECK(std::abs(scatter(sleeved, host, 2, Polarisation::across)[1] / across - 1.0) < 1e-4);
    CHECK(std::abs(scatter(sleeved, host, 2, Polarisation::across)[0] / (-i1 * pi / 4.0 * x * x * share) + 1.0) < 1e-3);
}

TEST_CASE("A lossless target gives back all it takes, order by order, walled or not") {
    const Inner host{false, 1.0, 1.0};
    for (const Polarisation polarisation : {Polarisation::along, Polarisation::across}) {
        for (const double eps : {0.11, 0.5, 3.0, 9.0}) {
            const Inner inside{false, std::sqrt(eps), eps}, wall{false, std::sqrt(0.25), 0.25};
            for (const Cylinder& c : {Cylinder{1.7, inside, 0.0, {}}, Cylinder{1.7, inside, 0.3, wall},
                                      Cylinder{1.7, {true, {}, {}}, 0.3, wall}}) {
                for (const Complex& s : scatter(c, host, 12, polarisation))
                    CHECK(std::abs(std::abs(1.0 + 2.0 * s) - 1.0) < 1e-10);
            }
        }
    }
}

TEST_CASE("A wall of the filling's own stuff is no wall, one of the host's own shrinks the target") {
    const Inner host{false, {3.0, -0.1}, {9.0, -0.6}}, inside{false, {1.5, -0.2}, {2.2, -0.6}};
    for (const Polarisation polarisation : {Polarisation::along, Polarisation::across}) {
        const auto plain = scatter({0.4, inside, 0.0, {}}, host, 6, polarisation);
        const auto same = scatter({0.4, inside, 0.1, inside}, host, 6, polarisation);
        const auto shrunk = scatter({0.3, inside, 0.0, {}}, host, 6, polarisation);
        const auto wrapped = scatter({0.4, inside, 0.1, host}, host, 6, polarisation);
        for (int n = 0; n <= 6; ++n) {
            CHECK(std::abs(plain[n] - same[n]) < 1e-11 * std::abs(plain[n]) + 1e-16);
            CHECK(std::abs(shrunk[n] - wrapped[n]) < 1e-11 * std::abs(shrunk[n]) + 1e-16);
        }
    }
}

TEST_CASE("Two coupled lossless targets scatter just what they take out of the wave") {
    // Optical theorem in two dimensions, for the joint answer without boundaries: with f the far field of a plane wave
    // of unit strength, mean |f|^2 over all angles = -Re f(forward).
    Spectra none;
    none.k = Cx{1.0};
    const Host host{1, 0.0, 0.0};
    const Directions nowhere(none, 0);
    for (const Polarisation polarisation : {Polarisation::along, Polarisation::across}) {
        std::vector<Scatterer> targets;
        std::vector<const Paths*> own;
        const Level levels[2] = {level_at(5.0, 0.0, host, none, 0), level_at(3.96, 0.0, host, none, 0)};
        const Paths no_images(levels[0], levels[0], 0.0, 28, host, none, nowhere, 0);
        for (const double x : {0.0, 2.6}) {
            const Inner inside{false, std::sqrt(4.0 + x), 4.0 + x};
            Scatterer t{x, &levels[targets.size()], {}};
            for (const Complex& s : scatter({1.1, inside, 0.0, {}}, {false, 1.0, 1.0}, 14, polarisation))
                t.strength.push_back(std::sqrt(t.strength.empty() ? s : 2.0 * s));
            targets.push_back(t);
            own.push_back(&no_images);
        }
        const std::vector<Cx> G = couple(targets, own, host, none, nowhere, 0);
        const std::size_t rows = static_cast<std::size_t>(targets[0].rows() + targets[1].rows());
        // G^-1 of the rows of a plane wave that travels at an angle from the line.
        const auto lit = [&](double angle) {
            std::vector<Complex> u;
            for (const Scatterer& t : targets) {
                const Complex arrival = std::exp(-i1 * (t.x * std::cos(angle) + t.level->above * std::sin(angle)));
                for (int n = 0; n <= t.order(); ++n) {
                    const auto a = [&](int m) { return arrival * std::exp(-i1 * (m * (pi / 2 + angle))); };
                    const Complex half = 0.5 * Complex(t.strength[static_cast<std::size_t>(n)]) * std::pow(i1, n);
                    u.push_back(half * (a(n) + a(-n)));
                    if (n == 0) continue;
                    u.push_back(i1 * half * (a(n) - a(-n)));
                }
            }
            for (std::size_t i = 0; i < rows; ++i) {
                for (std::size_t k = 0; k < i; ++k) u[i] -= Complex(G[i * rows + k]) * u[k];
                u[i] /= Complex(G[i * rows + i]);
            }
            return u;
        };
        const double way = 0.7;  // of the incident wave
        const std::vector<Complex> sent = lit(way);
        const auto far = [&](double angle) {  // by reciprocity: what comes from there, going the other way
            const std::vector<Complex> heard = lit(angle + pi);
            Complex sum;
            for (std::size_t i = 0; i < rows; ++i) sum += heard[i] * sent[i];
            return sum;
        };
        double mean = 0.0;
        for (int i = 0; i < 360; ++i) mean += std::norm(far(2.0 * pi * i / 360)) / 360.0;
        CHECK(mean > 0.5);
        CHECK(std::abs(mean + far(way).real()) < 1e-6 * mean);
    }
}
