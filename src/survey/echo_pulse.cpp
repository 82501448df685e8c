#include "survey/echo_pulse.hpp"

#include <algorithm>
#include <cmath>

#include "wave/fourier.hpp"

namespace gg {
namespace {

constexpr int table_size =
    512;  // eight times the lines: cubic interpolation of the carrier-free record is good to 1e-4
constexpr double floor_db = 70.0;

Complex turn(double angle) { return {std::cos(angle), std::sin(angle)}; }

}  // namespace

PathSpectrum::PathSpectrum(const Stack& stack, const PulseShape& shape) {
    const Band band = band_of(shape, floor_db);
    spacing = band.width() / lines;
    // Lines stand on whole multiples of the spacing's half from the band's edge, so that none falls on 0 Hz.
    first = band.low + 0.5 * spacing;
    centre = shape.centre_frequency;
    sent.resize(lines);
    for (int i = 0; i < lines; ++i) sent[i] = spectrum_at(shape, frequency(i));
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
    carrier_ = spectrum.frequency(middle);
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

    table_.resize(table_size);
    for (int i = 0; i < table_size; ++i) table_[i] = record[(top_at + i + table_size / 2) % table_size];
    // The origin moves from the grid's highest instant to the true peak, and the record is scaled to 1 there.
    const double off = shift * step_;
    const Complex peak = at(off) * turn(-2.0 * pi * carrier_ * off);
    for (Complex& z : table_) z /= peak;
    origin_ = off;
    phase = peak / std::abs(peak) * turn(2.0 * pi * carrier_ * (offset * step_ + off));
    loss = -decibel_per_neper * (strongest + std::log(table_size * std::abs(peak) / sent_sum));

    const auto first_below = [&](double level_at, double sign) {
        double t = 0.0;
        const double dt = step_;
        while (t < reach && envelope(sign * t) > level_at) t += dt;
        const double e1 = envelope(sign * t), e0 = envelope(sign * (t - dt));
        return t - (e0 > e1 ? dt * (level_at - e1) / (e0 - e1) : 0.0);
    };
    width = first_below(0.5, -1.0) + first_below(0.5, 1.0);
    const auto last_above = [&](double sign) {
        double t = 0.8 * reach;
        while (t > step_ && envelope(sign * t) < 0.05) t -= step_;
        return t;
    };
    lead = last_above(-1.0);
    tail = last_above(1.0);
}

Complex EchoPulse::at(double t) const {
    const double place = (t + origin_ + reach) / step_;
    if (!(place >= 1.0 && place < table_size - 3)) return {0.0, 0.0};
    const int i = static_cast<int>(place);
    const double u = place - i;
    // Cubic (Lagrange) through four neighbours.
    const double w0 = -u * (u - 1.0) * (u - 2.0) / 6.0, w1 = (u + 1.0) * (u - 1.0) * (u - 2.0) / 2.0;
    const double w2 = -(u + 1.0) * u * (u - 2.0) / 2.0, w3 = (u + 1.0) * u * (u - 1.0) / 6.0;
    const double re =
        w0 * table_[i - 1].real() + w1 * table_[i].real() + w2 * table_[i + 1].real() + w3 * table_[i + 2].real();
    const double im =
        w0 * table_[i - 1].imag() + w1 * table_[i].imag() + w2 * table_[i + 1].imag() + w3 * table_[i + 2].imag();
    const double c = std::cos(2.0 * pi * carrier_ * t), s = std::sin(2.0 * pi * carrier_ * t);
    return {re * c - im * s, re * s + im * c};
}

double EchoPulse::envelope(double t) const {
    const double place = (t + origin_ + reach) / step_;
    if (!(place >= 1.0 && place < table_size - 3)) return 0.0;
    const int i = static_cast<int>(place);
    const double u = place - i;
    return (1.0 - u) * std::sqrt(std::norm(table_[i])) + u * std::sqrt(std::norm(table_[i + 1]));
}

}  // namespace gg
