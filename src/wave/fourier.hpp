#pragma once
/// Fourier transforms, by a library (Eigen's FFT module). Lengths of 2, 3 and 5 are fast; any length works.
#include <span>
#include <vector>

#include "wave/constants.hpp"

namespace gg {

/// Half spectrum (n/2 + 1 values) of n real values: X_k = sum x_i exp(-2 pi j i k / n).
std::vector<Complex> forward(std::span<const double> values);
/// The n real values of a half spectrum; exact inverse of forward(), 1/n included.
std::vector<double> inverse(std::span<const Complex> half, std::size_t n);
/// Complex transforms, forward without and inverse with 1/n.
std::vector<Complex> forward(std::span<const Complex> values);
std::vector<Complex> inverse(std::span<const Complex> values);
/// Smallest low * 2^m that is at least `wanted`, but no more than about `high`: a fast length.
std::size_t length_of_two(double wanted, std::size_t low, std::size_t high);
/// Envelope (magnitude of the analytic signal), same length.
std::vector<double> envelope(std::span<const double> values);

}  // namespace gg
