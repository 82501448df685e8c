#include "wave/pulse.hpp"

#include <algorithm>

#include "wave/fourier.hpp"

namespace gg {
namespace {

/// Both roots x of x^2 exp(1 - x^2) = exp(-d), d >= 0: x = sqrt(-W(-exp(-1 - d))) on the branches W_0 and W_-1 of
/// Lambert's function, by Newton on its logarithm so that nothing underflows. Both starts lie on the outer side of the
/// root of a convex function, so that Newton walks in without overshoot.
Band unit_edges(double d) {
    const auto root = [d](double w) {  // exp(w) - w - 1 = d, w = ln x^2
        for (int i = 0; i < 60; ++i) {
            const double slope = std::expm1(w);
            const double step = (slope - w - d) / slope;
            w -= step;
            if (!(std::abs(step) > 1e-15 * std::abs(w))) break;
        }
        return std::exp(0.5 * w);
    };
    if (!(d > 1e-12)) return {1.0, 1.0};
    return {root(-1.0 - d), root(std::log1p(d + std::sqrt(2.0 * d)))};
}

constexpr double ten_db = 1.1512925464970229;  // ln(10) / 2, Np

Band edges(double order, double drop) { return unit_edges(2.0 * drop / order); }

bool legal(const PulseShape& shape) { return shape.centre_frequency >= 1e3 && shape.centre_frequency <= 1e13; }

}  // namespace

double log_spectrum(double order, double ratio) { return order * (std::log(ratio) + 0.5 * (1.0 - ratio * ratio)); }

double order_of(const PulseShape& shape) {
    if (shape.family == PulseFamily::ricker || !std::isfinite(shape.bandwidth)) return 2.0;
    const double wanted = std::clamp(shape.bandwidth, 0.3, 1.6);
    const auto misfit = [wanted](double log_order) {
        const Band band = edges(std::exp(log_order), ten_db);
        return std::log(band.width() / band.middle() / wanted);
    };
    // The logarithm of the bandwidth falls almost straight with that of the order: the secant needs about six steps.
    double a = std::log(4.6 / (wanted * wanted)), b = a - 0.3, fa = misfit(a);
    for (int i = 0; i < 30; ++i) {
        const double fb = misfit(b);
        if (!(std::abs(fb) > 1e-14) || fb == fa) break;
        const double c = b - fb * (b - a) / (fb - fa);
        a = b;
        fa = fb;
        b = std::clamp(c, -2.0, 6.0);
    }
    return std::exp(b);
}

Band band_of(const PulseShape& shape, double drop_db) {
    if (!legal(shape) || !(drop_db > 0.0)) return {};
    const Band x = edges(order_of(shape), drop_db / decibel_per_neper);
    return {x.low * shape.centre_frequency, x.high * shape.centre_frequency};
}

double spectrum_at(const PulseShape& shape, double frequency) {
    if (!legal(shape) || !(frequency > 0.0)) return 0.0;
    return std::exp(log_spectrum(order_of(shape), frequency / shape.centre_frequency));
}

Signal sent_pulse(const PulseShape& shape) {
    const double fp = legal(shape) ? shape.centre_frequency : 1e9, n = order_of(shape);
    // The envelope falls like a Gaussian of sqrt(2 n) / (2 pi fp): 4.5 of them and a period on either side.
    const double half = (1.0 + std::sqrt(n)) / fp, step = 1.0 / (32.0 * fp);
    const std::size_t size = length_of_two(3.0 * half / step, 256, 4096);
    std::vector<Complex> spectrum(size / 2 + 1);
    double sum = 0.0;
    for (std::size_t k = 1; k < spectrum.size(); ++k) {
        const double value = std::exp(log_spectrum(n, static_cast<double>(k) * 32.0 / static_cast<double>(size)));
        spectrum[k] = value;
        sum += k + 1 == spectrum.size() ? value : 2.0 * value;
    }
    const std::vector<double> ring = inverse(spectrum, size);
    const auto side = static_cast<std::size_t>(std::ceil(half / step));
    Signal signal{-static_cast<double>(side) * step, step, std::vector<double>(2 * side + 1)};
    for (std::size_t i = 0; i < signal.values.size(); ++i)
        signal.values[i] = ring[(i + size - side) % size] * static_cast<double>(size) / sum;
    return signal;
}

}  // namespace gg
