#pragma once
/// The returned pulse at any instant, cheaply: the complex (analytic) signal of one echo, for every ground and depth of
/// the unknown. wave's returned_pulse() is the reference that tests hold it against.
#include <array>
#include <memory>
#include <vector>

#include "wave/pulse.hpp"

namespace gg {

/// What is sent, on a grid of frequencies that covers it down to -70 dB: the same for every ground.
struct SentSpectrum {
    explicit SentSpectrum(const PulseShape& shape);
    static constexpr int lines = 64;
    double first = 0.0, spacing = 0.0;     ///< Hz
    double mean_frequency = 0.0;           ///< Hz, of the amplitude spectrum
    double sum = 0.0;                      ///< of the amplitudes, peak 1
    std::array<double, lines> log_sent{};  ///< logarithm of the amplitude, Np
    double frequency(int i) const { return first + i * spacing; }
};

/// Wavenumbers of one layer on that grid, 1/m.
using Wavenumbers = std::array<Complex, SentSpectrum::lines>;
Wavenumbers wavenumbers_of(const Material& material, const SentSpectrum& sent);

/// A stack's wavenumbers, layer by layer; grounds that have a layer in common share its.
struct PathSpectrum {
    std::shared_ptr<const SentSpectrum> sent;
    std::vector<std::shared_ptr<const Wavenumbers>> layers;
};

class EchoPulse {
  public:
    EchoPulse() = default;
    /// Straight down to `depth` and back, antenna `height` above the surface; exact two-way plane-wave path.
    EchoPulse(const PathSpectrum& spectrum, const Stack& stack, double depth, double height);

    /// Analytic signal `t` s after the envelope's peak, scaled to 1 + 0j at the peak: its real part is the trace with
    /// the echo's own phase turned back to zero, its magnitude the envelope. 0 outside the record.
    Complex at(double t) const;
    /// Its real part alone.
    double upright(double t) const;
    double envelope(double t) const;
    /// The trace itself, peak envelope 1, with the phase it arrives with.
    double trace(double t) const { return (at(t) * phase).real(); }

    Complex phase{1.0, 0.0};
    double arrival = 0.0;           ///< s, time of the envelope's peak
    double loss = 0.0;              ///< dB, two-way: how far the envelope's peak is below that of the sent pulse
    double width = 0.0;             ///< s, envelope's full width at half its peak
    double lead = 0.0, tail = 0.0;  ///< s before and after the peak beyond which the envelope stays under 5 %
    double frequency = 0.0;         ///< Hz, mean of the amplitude spectrum
    double reach = 0.0;             ///< s, half-length of the record

  private:
    void measure();
    template <class Part>
    auto between(double t, Part part) const;
    std::vector<Complex> table_;  ///< even steps from -reach; the peak stands `origin_` after the middle
    double step_ = 1.0, origin_ = 0.0;
};

}  // namespace gg
