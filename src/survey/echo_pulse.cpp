#include "survey/echo_pulse.hpp"

#include <algorithm>
#include <cmath>

#include "wave/fourier.hpp"

namespace gg {
namespace {

constexpr int table_size = 512;  // eight times the lines, see at()
constexpr double floor_db = 70.0;

Complex turn(double angle) { return {std::cos(angle), std::sin(angle)}; }

}  // namespace

SentSpectrum::SentSpectrum(const PulseShape& shape) {
    const Band band = band_of(shape, floor_db);
    const double order = order_of(shape);
    spacing = band.width() / lines;
    // In the middle of each strip of the band, so that none falls on 0 Hz.
    first = band.low + 0.5 * spacing;
    for (int i = 0; i < lines; ++i) {
        log_sent[i] = log_spectrum(order, frequency(i) / shape.centre_frequency);
        const double amplitude = std::exp(log_sent[i]);
        sum += amplitude;
        mean_frequency += amplitude * frequency(i);
    }
    mean_frequency /= sum;
}

Wavenumbers wavenumbers_of(const Material& material, const SentSpectrum& sent) {
    Wavenumbers k;
    for (int i = 0; i < SentSpectrum::lines; ++i) k[i] = wavenumber(material, sent.frequency(i));
    return k;
}

EchoPulse::EchoPulse(const PathSpectrum& spectrum, const Stack& stack, double depth, double height) {
    constexpr int N = SentSpectrum::lines;
    const SentSpectrum& sent = *spectrum.sent;
    std::array<Complex, N> exponent{};  // -2 j sum k h
    double top = 0.0;
    for (std::size_t layer = 0; layer < stack.slabs.size() && top < depth; ++layer) {
        const bool last = layer + 1 == stack.slabs.size();
        const double h = last ? depth - top : std::min(stack.slabs[layer].thickness, depth - top);
        const Wavenumbers& k = *spectrum.layers[layer];
        for (int i = 0; i < N; ++i) exponent[i] += Complex(2.0 * h * k[i].imag(), -2.0 * h * k[i].real());
        top += h;
    }
    // The strongest line sets the scale, so that no ground however lossy makes the record vanish.
    double strongest = -1e300;
    int peak_line = 0;
    std::array<double, N> level;
    for (int i = 0; i < N; ++i) {
        level[i] = sent.log_sent[i] + exponent[i].real();
        if (level[i] > strongest) strongest = level[i], peak_line = i;
    }
    // Group delay at the strongest line puts the pulse in the middle of the record.
    const int a = std::max(0, peak_line - 1), b = std::min(N - 1, peak_line + 1);
    const double delay = -(exponent[b].imag() - exponent[a].imag()) / (2.0 * pi * sent.spacing * (b - a));

    std::vector<Complex> padded(table_size);
    double sum = 0.0, moment = 0.0;
    const int middle = N / 2;
    for (int i = 0; i < N; ++i) {
        const double amplitude = std::exp(level[i] - strongest);
        const double f = sent.frequency(i);
        sum += amplitude;
        moment += amplitude * f;
        const int bin = (i - middle + table_size) % table_size;
        padded[bin] = amplitude * turn(exponent[i].imag() + 2.0 * pi * f * delay);
    }
    frequency = moment / sum;
    const double carrier_frequency = sent.frequency(middle);
    const std::vector<Complex> record = inverse(padded);
    step_ = 1.0 / (sent.spacing * table_size);
    reach = 0.5 * table_size * step_;

    int top_at = 0;
    for (int i = 1; i < table_size; ++i) {
        if (std::norm(record[i]) > std::norm(record[top_at])) top_at = i;
    }
    // Parabola through the three highest: the peak between the grid's instants.
    const auto size_at = [&](int i) { return std::abs(record[(i + table_size) % table_size]); };
    const double left = size_at(top_at - 1), mid = size_at(top_at), right = size_at(top_at + 1);
    const double bend = left - 2.0 * mid + right;
    const double shift = bend < 0.0 ? std::clamp(0.5 * (left - right) / bend, -0.5, 0.5) : 0.0;
    const int offset = top_at < table_size / 2 ? top_at : top_at - table_size;
    arrival = delay + (offset + shift) * step_ + 2.0 * height / speed_of_light;

    // The carrier goes into the table, so that reading it needs no sine; the origin moves from the grid's highest
    // instant to the true peak, and the record is scaled to 1 there.
    table_.resize(table_size);
    Complex carrier = turn(-2.0 * pi * carrier_frequency * reach);
    const Complex onward = turn(2.0 * pi * carrier_frequency * step_);
    for (int i = 0; i < table_size; ++i) {
        table_[i] = carrier * record[(top_at + i + table_size / 2) % table_size];
        carrier *= onward;
    }
    const Complex peak = at(shift * step_);
    const Complex scale = 1.0 / peak;
    for (Complex& z : table_) z *= scale;
    origin_ = shift * step_;
    phase = peak / std::abs(peak) * turn(2.0 * pi * carrier_frequency * offset * step_);
    loss = -decibel_per_neper * (strongest + std::log(table_size * std::abs(peak) / sent.sum));
    measure();
}

void EchoPulse::measure() {
    const int middle = table_size / 2;
    // Half-width on one side, from the first grid instant under half the peak back to the crossing.
    const auto half = [&](int sense) {
        int i = middle;
        while (i > 1 && i < table_size - 2 && std::norm(table_[i]) > 0.25) i += sense;
        const double here = std::abs(table_[i]), before = std::abs(table_[i - sense]);
        const double back = before > here ? std::clamp((0.5 - here) / (before - here), 0.0, 1.0) : 0.0;
        return ((i - middle) * sense - back) * step_;
    };
    width = half(-1) + half(1);
    const auto last_above = [&](int sense) {
        int i = middle + sense * 2 * table_size / 5;
        while (i != middle && std::norm(table_[i]) < 0.05 * 0.05) i -= sense;
        return std::max(1, (i - middle) * sense) * step_;
    };
    lead = last_above(-1);
    tail = last_above(1);
}

template <class Part>
auto EchoPulse::between(double t, Part part) const {
    const double place = (t + origin_ + reach) / step_;
    if (!(place >= 2.0 && place < table_size - 4)) return part(Complex{});
    const int i = static_cast<int>(place);
    const double u = place - i;
    // Lagrange through six neighbours at -2 .. 3: with 17 places a period of the centre frequency good to 1e-5.
    const double a = u + 2.0, b = u + 1.0, c = u, d = u - 1.0, e = u - 2.0, f = u - 3.0;
    const double ab = a * b, ef = e * f, cd = c * d;
    const Complex* z = table_.data() + i - 2;
    return (1.0 / 12.0) * (ab * ef * (c * part(z[3]) - d * part(z[2]))) +
           (1.0 / 24.0) * (cd * (a * ef * part(z[1]) - ab * f * part(z[4]))) +
           (1.0 / 120.0) * (cd * (ab * e * part(z[5]) - b * ef * part(z[0])));
}

Complex EchoPulse::at(double t) const {
    return between(t, [](const Complex& z) { return z; });
}
double EchoPulse::upright(double t) const {
    return between(t, [](const Complex& z) { return z.real(); });
}

double EchoPulse::envelope(double t) const { return std::sqrt(std::norm(at(t))); }

}  // namespace gg
