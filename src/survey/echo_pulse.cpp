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

PathSpectrum::PathSpectrum(const Stack& stack, const PulseShape& shape) {
    const Band band = band_of(shape, floor_db);
    spacing = band.width() / lines;
    // In the middle of each strip of the band, so that none falls on 0 Hz.
    first = band.low + 0.5 * spacing;
    sent.resize(lines);
    double sum = 0.0;
    for (int i = 0; i < lines; ++i) {
        sent[i] = spectrum_at(shape, frequency(i));
        sum += sent[i];
        sent_frequency += sent[i] * frequency(i);
    }
    sent_frequency /= sum;
    wavenumber.reserve(stack.slabs.size() * lines);
    for (const Slab& slab : stack.slabs) {
        for (int i = 0; i < lines; ++i) wavenumber.push_back(plane_wave(slab.material, frequency(i)).wavenumber);
    }
}

EchoPulse::EchoPulse(const PathSpectrum& spectrum, const Stack& stack, double depth, double height) {
    constexpr int N = PathSpectrum::lines;
    std::vector<Complex> exponent(N);  // -2 j sum k h
    double top = 0.0;
    for (std::size_t layer = 0; layer < stack.slabs.size() && top < depth; ++layer) {
        const bool last = layer + 1 == stack.slabs.size();
        const double h = last ? depth - top : std::min(stack.slabs[layer].thickness, depth - top);
        for (int i = 0; i < N; ++i) exponent[i] += Complex(0.0, -2.0 * h) * spectrum.wavenumber[layer * N + i];
        top += h;
    }
    // The strongest line sets the scale, so that no ground however lossy makes the record vanish.
    double strongest = -1e300;
    int peak_line = 0;
    std::vector<double> level(N);
    for (int i = 0; i < N; ++i) {
        level[i] = std::log(std::max(spectrum.sent[i], 1e-30)) + exponent[i].real();
        if (level[i] > strongest) strongest = level[i], peak_line = i;
    }
    // Group delay at the strongest line puts the pulse in the middle of the record.
    const int a = std::max(0, peak_line - 1), b = std::min(N - 1, peak_line + 1);
    const double delay = -(exponent[b].imag() - exponent[a].imag()) / (2.0 * pi * spectrum.spacing * (b - a));

    std::vector<Complex> padded(table_size);
    double sum = 0.0, moment = 0.0, sent_sum = 0.0;
    const int middle = N / 2;
    for (int i = 0; i < N; ++i) {
        const double amplitude = std::exp(level[i] - strongest);
        const double f = spectrum.frequency(i);
        sum += amplitude;
        moment += amplitude * f;
        sent_sum += spectrum.sent[i];
        const int bin = (i - middle + table_size) % table_size;
        padded[bin] = amplitude * turn(exponent[i].imag() + 2.0 * pi * f * delay);
    }
    frequency = moment / sum;
    const double carrier_frequency = spectrum.frequency(middle);
    const std::vector<Complex> record = inverse(padded);
    step_ = 1.0 / (spectrum.spacing * table_size);
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
    for (Complex& z : table_) z /= peak;
    origin_ = shift * step_;
    phase = peak / std::abs(peak) * turn(2.0 * pi * carrier_frequency * offset * step_);
    loss = -decibel_per_neper * (strongest + std::log(table_size * std::abs(peak) / sent_sum));
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

Complex EchoPulse::at(double t) const {
    const double place = (t + origin_ + reach) / step_;
    if (!(place >= 2.0 && place < table_size - 4)) return {0.0, 0.0};
    const int i = static_cast<int>(place);
    const double u = place - i;
    // Lagrange through six neighbours at -2 .. 3: with 17 places a period of the centre frequency good to 1e-5.
    const double a = u + 2.0, b = u + 1.0, c = u, d = u - 1.0, e = u - 2.0, f = u - 3.0;
    const double ab = a * b, ef = e * f, cd = c * d;
    const double w0 = -b * cd * ef / 120.0, w1 = a * cd * ef / 24.0, w2 = -ab * d * ef / 12.0;
    const double w3 = ab * c * ef / 12.0, w4 = -ab * cd * f / 24.0, w5 = ab * cd * e / 120.0;
    const Complex* z = table_.data() + i - 2;
    return {
        w0 * z[0].real() + w1 * z[1].real() + w2 * z[2].real() + w3 * z[3].real() + w4 * z[4].real() + w5 * z[5].real(),
        w0 * z[0].imag() + w1 * z[1].imag() + w2 * z[2].imag() + w3 * z[3].imag() + w4 * z[4].imag() +
            w5 * z[5].imag()};
}

double EchoPulse::envelope(double t) const { return std::sqrt(std::norm(at(t))); }

}  // namespace gg
