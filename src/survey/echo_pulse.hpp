#pragma once
/// The returned pulse at any instant, cheaply: the complex (analytic) signal of one echo, for every ground and depth of
/// the unknown. wave's returned_pulse() is the reference that tests hold it against.
#include <vector>

#include "wave/pulse.hpp"

namespace gg {

/// The sent spectrum and the wavenumbers of a stack on a grid of frequencies that covers the sent pulse down to -70 dB.
struct PathSpectrum {
    PathSpectrum(const Stack& stack, const PulseShape& shape);
    static constexpr int lines = 64;
    double first = 0.0, spacing = 0.0;  ///< Hz
    double sent_frequency = 0.0;        ///< Hz, mean of the sent amplitude spectrum
    std::vector<double> sent;           ///< amplitude, `lines` of them
    std::vector<Complex> wavenumber;    ///< 1/m, layer by layer
    double frequency(int i) const { return first + i * spacing; }
};

class EchoPulse {
  public:
    EchoPulse() = default;
    /// Straight down to `depth` and back, antenna `height` above the surface; exact two-way plane-wave path.
    EchoPulse(const PathSpectrum& spectrum, const Stack& stack, double depth, double height);

    /// Analytic signal `t` s after the envelope's peak, scaled to 1 + 0j at the peak: its real part is the trace with
    /// the echo's own phase turned back to zero, its magnitude the envelope. 0 outside the record.
    Complex at(double t) const;
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
    std::vector<Complex> table_;  ///< even steps from -reach; the peak stands `origin_` after the middle
    double step_ = 1.0, origin_ = 0.0;
};

}  // namespace gg
