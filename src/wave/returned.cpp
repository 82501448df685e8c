#include <algorithm>

#include "wave/fourier.hpp"
#include "wave/pulse.hpp"

namespace gg {
namespace {

struct Leg {
    const Material* material;
    double length;  // m, one way
};

/// Lowest frequency an antenna is taken to radiate, of its peak frequency. Without it what comes back through much loss
/// would be the diffusing tail of the formula's spectrum, far below what any antenna sends. The cut is soft up to twice
/// that; it takes 1e-4 from the sent peak.
constexpr double lowest = 0.03;
double fade(double x) {
    if (x >= 2.0 * lowest) return 0.0;
    return x > lowest ? 2.0 * std::log(std::sin(0.5 * pi * (x / lowest - 1.0))) : -1e9;
}

/// The sent spectrum after the way down and back: logarithm of the amplitude, and the phase lag in rad.
class Path {
  public:
    Path(const Stack& stack, double depth, const PulseShape& shape)
        : order_(order_of(shape)), peak_(shape.centre_frequency) {
        double top = 0.0;
        const int last = layer_at(stack, depth);
        for (int i = 0; i <= last; ++i) {
            const Slab& slab = stack.slabs[static_cast<std::size_t>(i)];
            const double base = i == last ? depth : top_of(stack, i + 1);
            if (base > top) legs_.push_back({&slab.material, base - top});
            top = base;
        }
    }
    struct Point {
        double level, lag;
    };
    Point at(double f) const {
        const double x = f / peak_;
        Complex sum{};
        for (const Leg& leg : legs_) sum += std::sqrt(permittivity(*leg.material, f).value) * leg.length;
        const Complex phase = 4.0 * pi * f / speed_of_light * sum;
        return {log_spectrum(order_, x) + fade(x) + phase.imag(), phase.real()};
    }
    Issue issue() const {
        Issue worst = Issue::none;
        for (const Leg& leg : legs_) worst = worse(worst, permittivity(*leg.material, peak_).issue);
        return worst;
    }

  private:
    double order_, peak_;
    std::vector<Leg> legs_;
};

constexpr double ten_db = 1.1512925464970229;  // ln(10) / 2, Np
constexpr double silent = 9.2;                 // Np, 1e-4 of the peak: what lies lower is left out of the sum
constexpr double faintest = -690.0;            // Np, about the smallest number there is: deeper stands as this

/// Integral of the sent spectrum over frequency, Hz: the one-sided sum whose real part peaks at 1.
double spectrum_area(const PulseShape& shape) {
    const double n = order_of(shape), h = 0.5 * (n + 1.0);
    return 0.5 * shape.centre_frequency * std::exp(0.5 * n + h * std::log(2.0 / n) + std::lgamma(h));
}

/// What a first look along a few frequencies tells: where the returned spectrum lies and how far its parts arrive
/// apart.
struct Look {
    double peak = 0.0, low = 0.0, high = 0.0;  // Hz: peak, and where the spectrum falls to `silent`
    double width = 0.0;                        // Hz, -10 dB
    double first = 0.0, last = 0.0;            // s, group delays down to `silent`
    double delay = 0.0;                        // s, at the peak
};

Look look_along(const Path& path, const PulseShape& shape) {
    const Band sent = band_of(shape, 20.0 * silent / std::log(10.0) * 0.999);
    constexpr std::size_t count = 18;
    const double from = std::max(0.2 * sent.low, 1.02 * lowest * shape.centre_frequency);
    const double ratio = std::pow(sent.high / from, 1.0 / (count - 1));
    double f[count];
    Path::Point point[count];
    std::size_t top = 0;
    for (std::size_t i = 0; i < count; ++i) {
        f[i] = i == 0 ? from : f[i - 1] * ratio;
        point[i] = path.at(f[i]);
        if (point[i].level > point[top].level) top = i;
    }
    const auto crossing = [&](double drop, bool up) {
        std::size_t i = top;
        const double wanted = point[top].level - drop;
        while (up ? i + 1 < count : i > 0) {
            const std::size_t next = up ? i + 1 : i - 1;
            if (point[next].level < wanted)
                return f[i] + (f[next] - f[i]) * (point[i].level - wanted) / (point[i].level - point[next].level);
            i = next;
        }
        return f[i];
    };
    Look look;
    look.peak = f[top];
    look.low = crossing(silent, false);
    look.high = crossing(silent, true);
    look.width = crossing(ten_db, true) - crossing(ten_db, false);
    const auto delay = [&](std::size_t i) {
        return (point[i + 1].lag - point[i].lag) / (2.0 * pi * (f[i + 1] - f[i]));
    };
    look.delay = look.first = look.last = delay(std::min(top, count - 2));
    for (std::size_t i = 0; i + 1 < count; ++i) {
        if (point[i].level < point[top].level - silent) continue;
        look.first = std::min(look.first, delay(i));
        look.last = std::max(look.last, delay(i));
    }
    return look;
}

/// Frequency near `f` where the spectrum peaks: parabolas through three points, ever closer, each kept only if it
/// climbs.
double climb(const Path& path, double f, double span) {
    double level = path.at(f).level;
    for (int round = 0; round < 2; ++round, span *= 0.15) {
        const double a = path.at(f - span).level, c = path.at(f + span).level, bend = a - 2.0 * level + c;
        if (!(bend < 0.0)) continue;
        const double next = f + std::clamp(0.5 * (a - c) / bend, -1.0, 1.0) * span, there = path.at(next).level;
        if (!(there > level)) continue;
        f = next;
        level = there;
    }
    return f;
}

/// Where the level is `wanted`, between `inside` (above it) and `outside`: regula falsi, with the stale end relaxed.
double edge(const Path& path, double inside, double outside, double wanted) {
    double a = inside, b = outside, fa = path.at(a).level - wanted, fb = path.at(b).level - wanted;
    if (!(fa > 0.0 && fb < 0.0)) return outside;
    for (int round = 0; round < 8 && std::abs(b - a) > 1e-5 * a; ++round) {
        const double m = a + (b - a) * fa / (fa - fb), fm = path.at(m).level - wanted;
        if (std::abs(fm) < 1e-5) return m;
        if (fm > 0.0) {
            a = m;
            fa = fm;
            fb *= 0.5;
        } else {
            b = m;
            fb = fm;
            fa *= 0.5;
        }
    }
    return a + (b - a) * fa / (fa - fb);
}

/// Full width at half the peak; the top is `peak` at index `top`.
double half_width(const Signal& envelope, std::size_t top, double peak) {
    const std::vector<double>& e = envelope.values;
    std::size_t i = top, j = top;
    while (i > 0 && e[i] > 0.5 * peak) --i;
    while (j + 1 < e.size() && e[j] > 0.5 * peak) ++j;
    const auto share = [&](std::size_t low, std::size_t high) {
        const double rise = e[high] - e[low];
        return rise > 0.0 ? std::clamp((0.5 * peak - e[low]) / rise, 0.0, 1.0) : 0.0;
    };
    const double left = static_cast<double>(i) + (i < top ? share(i, i + 1) : 0.0);
    const double right = static_cast<double>(j) - (j > top ? share(j, j - 1) : 0.0);
    return (right - left) * envelope.step;
}

}  // namespace

Returned returned_pulse(const Stack& stack, double depth, const PulseShape& shape) {
    Returned result;
    const bool finite_input = std::isfinite(depth) && std::isfinite(shape.centre_frequency);
    const bool sensible =
        depth >= 0.0 && depth <= 1e4 && shape.centre_frequency >= 1e3 && shape.centre_frequency <= 1e13;
    if (!sensible || stack.slabs.empty()) {
        result.signal = sent_pulse(shape);
        result.envelope = {result.signal.start, result.signal.step, envelope(result.signal.values)};
        result.issue = finite_input ? Issue::out_of_range : Issue::not_a_number;
        return result;
    }
    const Path path(stack, depth, shape);
    const Look look = look_along(path, shape);
    result.issue = path.issue();

    // The record repeats after `span`: 12 over the -10 dB width leaves less than 1e-3 of the peak to wrap around.
    // Past some 500 dB of loss the spectrum is a line so thin that the longest record cannot hold its echo: cut there.
    constexpr std::size_t longest = 4096;
    const double lead = 5.0 / look.width;
    const double span =
        std::min(12.0 / look.width + look.last - look.first, static_cast<double>(longest / 2 - 1) / look.high);
    const double start = std::min(look.delay, look.first + lead) - lead;
    const std::size_t size = length_of_two(span * std::max(24.0 * look.peak, 2.2 * look.high), 256, longest);
    const double df = 1.0 / span, dt = span / static_cast<double>(size);
    const auto last = static_cast<std::size_t>(std::max(1.0, std::floor(look.high / df)));
    const auto first = std::min(static_cast<std::size_t>(std::max(1.0, std::ceil(look.low / df))), last);

    std::vector<Path::Point> points(size);
    std::size_t highest = first;
    for (std::size_t k = first; k <= last; ++k) {
        points[k] = path.at(static_cast<double>(k) * df);
        if (points[k].level > points[highest].level) highest = k;
    }
    result.peak_frequency = climb(path, static_cast<double>(highest) * df, 0.5 * df);
    const double top_level = path.at(result.peak_frequency).level, loudest = points[highest].level;

    std::vector<Complex> spectrum(size);
    double power = 0.0, moment = 0.0;
    for (std::size_t k = first; k <= last; ++k) {
        const double f = static_cast<double>(k) * df, amplitude = std::exp(points[k].level - loudest);
        spectrum[k] = std::polar(amplitude, 2.0 * pi * f * start - points[k].lag);
        power += amplitude * amplitude;
        moment += f * amplitude * amplitude;
    }
    result.centre_frequency = moment / power;
    result.band = {edge(path, result.peak_frequency, look.low, top_level - ten_db),
                   edge(path, result.peak_frequency, look.high, top_level - ten_db)};

    // The one-sided sum is the analytic signal itself: its real part the pulse, its magnitude the envelope.
    const std::vector<Complex> analytic = inverse(spectrum);
    Signal& e = result.envelope;
    e = {start, dt, std::vector<double>(size)};
    std::size_t top = 0;
    for (std::size_t i = 0; i < size; ++i) {
        e.values[i] = std::abs(analytic[i]);
        if (e.values[i] > e.values[top]) top = i;
    }
    const double a = e.values[(top + size - 1) % size], b = e.values[top], c = e.values[(top + 1) % size];
    const double bend = a - 2.0 * b + c, shift = bend < 0.0 ? std::clamp(0.5 * (a - c) / bend, -0.5, 0.5) : 0.0;
    const double peak = b - 0.25 * (a - c) * shift;
    result.arrival = e.time(top) + shift * dt;
    result.width = half_width(e, top, peak);

    // All of the above at a spectral peak of 1, so that it holds however deep the loss; only now the true scale.
    const double scale = df * static_cast<double>(size) / spectrum_area(shape) * std::exp(std::max(loudest, faintest));
    result.amplitude = scale * peak;
    result.signal = {start, dt, std::vector<double>(size)};
    for (std::size_t i = 0; i < size; ++i) {
        result.signal.values[i] = scale * analytic[i].real();
        e.values[i] *= scale;
    }
    return result;
}

}  // namespace gg
