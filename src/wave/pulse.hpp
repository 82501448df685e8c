#pragma once
/// The pulse: what the antenna sends, and what is left of it after a lossy, dispersive path.
#include <span>
#include <vector>

#include "wave/layers.hpp"

namespace gg {

enum class PulseFamily : std::uint8_t { ricker, gaussian_derivative };

/// Amplitude spectrum (f/fp)^n exp(n (1 - (f/fp)^2) / 2), peak 1 at fp; n = 2 is the Ricker wavelet.
struct PulseShape {
    PulseFamily family = PulseFamily::ricker;
    double centre_frequency = 400e6;  ///< Hz, 1e3 to 1e13: the frequency fp at which the sent spectrum peaks
    double bandwidth = 1.34;  ///< -10 dB width over the -10 dB band's middle; gaussian_derivative only, 0.3 to 1.6
    bool operator==(const PulseShape&) const = default;
};

/// Order n of the family for a shape: 2 for Ricker, else found from the bandwidth.
double order_of(const PulseShape& shape);

struct Band {
    double low = 0.0, high = 0.0;  ///< Hz
    double middle() const { return 0.5 * (low + high); }
    double width() const { return high - low; }
};
/// Band at which the amplitude spectrum has fallen by `drop_db` (> 0) from its peak; closed form with Lambert W
/// (Wang 2015, Geophysics 80(2) A31-A37).
Band band_of(const PulseShape& shape, double drop_db = 10.0);

/// Amplitude spectrum at `frequency`, peak 1.
double spectrum_at(const PulseShape& shape, double frequency);
/// Logarithm (Np, <= 0) of the amplitude spectrum of an order at `ratio` (> 0) of the peak frequency: for many
/// frequencies quicker than spectrum_at(), which finds the order afresh.
double log_spectrum(double order, double ratio);

/// A real signal sampled evenly: value[i] at start + i * step.
struct Signal {
    double start = 0.0;  ///< s
    double step = 0.0;   ///< s, > 0
    std::vector<double> values;
    double time(std::size_t i) const { return start + static_cast<double>(i) * step; }
};

/// The sent pulse (of 1 GHz where the centre frequency is illegal), zero phase, centred on t = 0 with peak 1, on a grid
/// fine enough to draw (>= 24 samples a period at fp).
Signal sent_pulse(const PulseShape& shape);

/// The pulse back from a reflector at `depth` straight below, relative to a sent peak of 1: the exact two-way
/// plane-wave path exp(-2 j sum k_i h_i) in the frequency domain; interface losses and spreading are not in it (see
/// survey).
struct Returned {
    Signal signal;                  ///< on the true time axis (arrival near the two-way time)
    Signal envelope;                ///< same grid
    double arrival = 0.0;           ///< s, time of the envelope's peak
    double amplitude = 0.0;         ///< envelope peak, of a sent peak of 1
    double centre_frequency = 0.0;  ///< Hz, mean frequency weighted by power (spectral centroid): 1.064 fp for a Ricker
    double peak_frequency = 0.0;    ///< Hz, where the returned spectrum peaks
    Band band;                      ///< -10 dB band of the returned spectrum
    double width = 0.0;             ///< s, envelope full width at half its peak
    Issue issue = Issue::none;
};
/// @param depth  m, 0 to 1e4; outside, or at an illegal centre frequency, the sent pulse with an issue and no numbers.
/// Accuracy: 1e-3 of the peak up to about 100 dB of loss; beyond, the slow tail may wrap around the record by some
/// percent.
Returned returned_pulse(const Stack& stack, double depth, const PulseShape& shape);

/// Value of a band-limited signal between its samples, by trigonometric interpolation of the zero-padded record.
/// `values` sampled at `step` from `start`; evaluated at each of `at` (s);
/// 0 farther than half a record outside.
std::vector<double> band_limited(const Signal& samples, std::span<const double> at);

}  // namespace gg
