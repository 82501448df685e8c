#include "echo/recording.hpp"

#include <algorithm>
#include <cmath>

namespace gg {

static constexpr double damping = 6.0;  // delta times the length, Np

Complex source_spectrum(const PulseShape& pulse, Complex w) {
    const double n = order_of(pulse), fp = pulse.centre_frequency;
    const Complex x = w / (2.0 * pi * fp);
    const double peak = fp * std::exp(0.5 * n + 0.5 * (n + 1.0) * std::log(2.0 / n) + std::lgamma(0.5 * (n + 1.0)));
    return std::exp(n * (std::log(x) + 0.5 * (1.0 - x * x))) / peak;
}

double onset_of(const PulseShape& pulse) {
    // The family's envelope is exp(-(2 pi fp t)^2 / 2n).
    return std::sqrt(2.0 * order_of(pulse) * 18.4) / (2.0 * pi * pulse.centre_frequency);
}

Recording::Recording(const Scene& scene, double from, double to, int rows) : pulse_(scene.pulse) {
    const Sampling& s = scene.sampling;
    dt_ = s.window / s.samples;
    lead_ = static_cast<int>(std::clamp(std::ceil((s.start - from) / dt_), -1e8, 1e8));
    start_ = s.start - lead_ * dt_;
    const double latest = std::max(to, s.start + s.window);
    const double wanted = 1.1 * std::ceil((latest - start_) / dt_) + 2.0;
    size_ = static_cast<int>(std::min(wanted, 40.0 * (s.samples + std::abs(lead_))));
    while ((size_ = fast_length(size_)) % 4 != 0) ++size_;  // multiples of four are transformed as half as many
    delta_ = damping / length();
    for (int i = 0; i < s.samples; ++i) {
        const int at = i + lead_;
        gain_.push_back(at < 0 || at >= size_ ? 0.0 : std::exp(delta_ * at * dt_) / length());
    }
    bins_ = static_cast<std::size_t>(size_) / 2 + 1;
    field_.resize(static_cast<std::size_t>(rows) * bins_);
    half_.resize(bins_);
    time_.resize(static_cast<std::size_t>(size_));
}

std::vector<Tone> Recording::tones(double least) const {
    std::vector<Tone> out;
    const double top = 2.0 * pi * pulse_.centre_frequency, peak = std::abs(source_spectrum(pulse_, top));
    for (int k = 0;; ++k) {
        const Complex w{2.0 * pi * k / length(), -delta_}, sent = source_spectrum(pulse_, w);
        const double loudness = std::abs(sent) / peak;
        if (loudness >= least)
            out.push_back({k, w, loudness, sent * std::exp(Complex{0.0, 1.0} * w * start_)});
        else if (w.real() > top)
            return out;
    }
}

void Recording::add(int row, const Tone& tone, Complex value) {
    const int at = tone.k % size_, bin = std::min(at, size_ - at);
    const bool edge = tone.k > 0 && (bin == 0 || 2 * bin == size_);
    value *= tone.source;
    if (edge) value = 2.0 * value.real();
    if (at > size_ / 2) value = std::conj(value);
    field_[static_cast<std::size_t>(row) * bins_ + static_cast<std::size_t>(bin)] += std::complex<float>(value);
}

void Recording::trace(int row, double* out) {
    const std::size_t from = static_cast<std::size_t>(row) * bins_;
    for (std::size_t i = 0; i < bins_; ++i) half_[i] = field_[from + i];
    transform_.sum_real(half_.data(), time_.data(), size_);
    for (int i = 0; i < static_cast<int>(gain_.size()); ++i)
        out[i] = gain_[i] > 0.0 ? gain_[i] * time_[static_cast<std::size_t>(i + lead_)] : 0.0;
}

void Recording::clear() { std::fill(field_.begin(), field_.end(), std::complex<float>{}); }

}  // namespace gg
