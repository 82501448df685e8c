#pragma once
/// From frequencies w - j delta to traces: one inverse transform per trace, exp(+delta t) undone.
#include <complex>
#include <vector>

#include "echo/scene.hpp"
#include "echo/transform.hpp"

namespace gg {

/// How much of the pulse's spectrum is worth a frequency, of its peak.
constexpr double faintest = 1e-4;

/// Spectrum of the source current per hertz at a complex frequency, of peak 1 in time. The family's own formula,
/// continued: (f/fp)^n exp(n (1 - (f/fp)^2) / 2), over its integral over f.
Complex source_spectrum(const PulseShape& pulse, Complex w);

/// How long before its peak the sent pulse begins, s: there it has fallen to 1e-8.
double onset_of(const PulseShape& pulse);

struct Tone {
    int k = 0;              ///< number of periods in the recording's length
    Complex w;              ///< rad/s, Im = -delta
    double loudness = 0.0;  ///< of the pulse's spectrum here, of its peak
    Complex source;         ///< what its spectral values are multiplied by
};

/// A stretch of time that holds the wanted samples and has a fast length. The small negative imaginary part of the
/// frequency damps what comes after the stretch, which would wrap round to its early times, by exp(-6).
class Recording {
  public:
    /// @param from   s, nothing arrives before it    @param to  s, no echo begins after it    @param rows  of traces
    Recording(const Scene& scene, double from, double to, int rows);

    double end() const { return start_ + length(); }
    double delta() const { return delta_; }
    /// The frequencies that the pulse has, down to `least` of its spectral peak.
    std::vector<Tone> tones(double least) const;
    /// Adds a tone's spectral value to a row. Frequencies past the sampling's own Nyquist fold back, as they do when
    /// recorded.
    void add(int row, const Tone& tone, Complex value);
    /// The scene's samples of a row; zeros before `from`.
    void trace(int row, double* out);
    void clear();

  private:
    double length() const { return size_ * dt_; }
    PulseShape pulse_;
    double start_ = 0.0, dt_ = 0.0, delta_ = 0.0;
    int size_ = 0, lead_ = 0;   ///< samples; those before the first wanted one, negative: it comes after that
    std::vector<double> gain_;  ///< undoes the damping, sample by sample
    std::size_t bins_ = 0;
    std::vector<std::complex<float>> field_;  ///< rows of half spectra
    std::vector<Complex> half_;               ///< one of them
    std::vector<double> time_;
    Transform transform_;
};

}  // namespace gg
