#include "wave/fourier.hpp"

#include <unsupported/Eigen/FFT>

namespace gg {

std::vector<Complex> forward(std::span<const double> values) {
    if (values.empty()) return {};
    if (values.size() == 1) return {values[0]};  // here and below: the library does not take a length of one
    Eigen::FFT<double> fft(Eigen::default_fft_impl<double>(), Eigen::FFT<double>::HalfSpectrum);
    std::vector<Complex> half(values.size() / 2 + 1);
    fft.fwd(half.data(), values.data(), static_cast<Eigen::Index>(values.size()));
    return half;
}

std::vector<double> inverse(std::span<const Complex> half, std::size_t n) {
    if (n == 0 || half.size() != n / 2 + 1) return std::vector<double>(n, 0.0);
    if (n == 1) return {half[0].real()};
    Eigen::FFT<double> fft(Eigen::default_fft_impl<double>(), Eigen::FFT<double>::HalfSpectrum);
    std::vector<double> values(n);
    fft.inv(values.data(), half.data(), static_cast<Eigen::Index>(n));
    return values;
}

std::vector<Complex> forward(std::span<const Complex> values) {
    if (values.size() < 2) return {values.begin(), values.end()};
    Eigen::FFT<double> fft;
    std::vector<Complex> result(values.size());
    fft.fwd(result.data(), values.data(), static_cast<Eigen::Index>(values.size()));
    return result;
}

std::vector<Complex> inverse(std::span<const Complex> values) {
    if (values.size() < 2) return {values.begin(), values.end()};
    Eigen::FFT<double> fft;
    std::vector<Complex> result(values.size());
    fft.inv(result.data(), values.data(), static_cast<Eigen::Index>(values.size()));
    return result;
}

std::size_t length_of_two(double wanted, std::size_t low, std::size_t high) {
    std::size_t n = low;
    while (static_cast<double>(n) < wanted && n < high) n *= 2;
    return n;
}

std::vector<double> envelope(std::span<const double> values) {
    const std::size_t n = values.size();
    std::vector<Complex> spectrum = forward(values);
    spectrum.resize(n);
    // The analytic signal: positive frequencies twice, zero and (even n) Nyquist once, negative ones not.
    for (std::size_t k = 1; k < (n + 1) / 2; ++k) spectrum[k] *= 2.0;
    std::vector<double> result(n);
    const std::vector<Complex> analytic = inverse(spectrum);
    for (std::size_t i = 0; i < n; ++i) result[i] = std::abs(analytic[i]);
    return result;
}

}  // namespace gg
