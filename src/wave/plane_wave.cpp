#include "wave/plane_wave.hpp"

#include <algorithm>

namespace gg {
namespace {

/// Normal wavenumber over k0, sqrt(eps - s2): the root that goes on, or decays, away from the interface. Where a lossy
/// medium above makes the argument's imaginary part positive, the root with a positive real part continues the
/// lossless case up to the critical angle, and the decaying one beyond it.
Complex normal(Complex eps, Complex s2) {
    const Complex argument = eps - s2, q = std::sqrt(argument);
    return q.imag() > 0.0 && argument.real() <= 0.0 ? -q : q;
}

/// sqrt(eps) with a positive real part, eps' > 0: the library's root guards against more and takes three times as long.
Complex refractive_index(Complex eps) {
    const double square = std::norm(eps);
    if (!(square < 1e300)) return std::sqrt(eps);
    const double n = std::sqrt(0.5 * (eps.real() + std::sqrt(square)));
    return {n, 0.5 * eps.imag() / n};
}

Complex quotient(Complex a, Complex b) {
    const Complex r = a / b;
    return std::isfinite(r.real()) && std::isfinite(r.imag()) ? r : Complex{};
}

Fresnel interface(Complex e1, Complex q1, Complex e2, Complex q2) {
    return {quotient(q1 - q2, q1 + q2), quotient(e2 * q1 - e1 * q2, e2 * q1 + e1 * q2)};
}

}  // namespace

PlaneWave plane_wave(const Material& material, double frequency) {
    return plane_wave(permittivity(material, frequency), frequency);
}

PlaneWave plane_wave(Permittivity permittivity, double frequency) {
    PlaneWave wave{speed_of_light, 1.0, 0.0, 1e9, {}, vacuum_impedance, permittivity.issue};
    if (!(frequency > 0.0) || !std::isfinite(frequency)) {
        wave.issue = worse(wave.issue, std::isfinite(frequency) ? Issue::out_of_range : Issue::not_a_number);
        return wave;
    }
    const Complex n = refractive_index(permittivity.value);
    const double w = 2.0 * pi * frequency, k0 = w / speed_of_light;
    wave.wavenumber = k0 * n;
    wave.speed = speed_of_light / n.real();
    wave.wavelength = wave.speed / frequency;
    wave.attenuation = std::max(-wave.wavenumber.imag(), 0.0);
    wave.skin_depth = wave.attenuation > 1e-9 ? 1.0 / wave.attenuation : 1e9;
    wave.impedance = vacuum_impedance / n;
    return wave;
}

Complex wavenumber(const Material& material, double frequency) {
    return 2.0 * pi * frequency / speed_of_light * refractive_index(permittivity(material, frequency).value);
}

double low_loss_attenuation_db(double conductivity, double permittivity) {
    if (!(permittivity > 0.0)) return 0.0;
    return 0.5 * vacuum_impedance * decibel_per_neper * conductivity / std::sqrt(permittivity);
}

Fresnel fresnel(Complex permittivity1, Complex permittivity2, double angle) {
    const double s = std::sin(angle);
    const Complex s2 = permittivity1 * s * s;
    return interface(permittivity1, std::sqrt(permittivity1) * std::cos(angle), permittivity2,
                     normal(permittivity2, s2));
}

SlabEcho slab(Complex above, Complex inside, Complex below, double thickness, double frequency, double angle) {
    const double s = std::sin(angle);
    const Complex s2 = above * s * s;
    const Complex q1 = std::sqrt(above) * std::cos(angle), q2 = normal(inside, s2), q3 = normal(below, s2);
    const Fresnel top = interface(above, q1, inside, q2), base = interface(inside, q2, below, q3);
    const Complex pass = std::exp(Complex{0.0, -2.0 * pi * frequency / speed_of_light * thickness} * q2);
    const auto reflect = [&](Complex r, Complex t) { return quotient(r + t * pass * pass, 1.0 + r * t * pass * pass); };
    const auto transmit = [&](Complex r, Complex t) {
        return quotient((1.0 + r) * (1.0 + t) * pass, 1.0 + r * t * pass * pass);
    };
    return {{reflect(top.te, base.te), reflect(top.tm, base.tm)},
            {transmit(top.te, base.te), transmit(top.tm, base.tm)}};
}

}  // namespace gg
