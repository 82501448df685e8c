#include "echo/ring.hpp"

#include <algorithm>
#include <cmath>

namespace gg {
namespace {

constexpr double oversampling = 1.4;
constexpr int taps = 16;

/// Rows of positions, real and imaginary parts apart so that the compiler can work on several positions at once.
constexpr int lane = 8;
struct Rows {
    int width = 0;
    std::vector<double> re, im;
    Rows(int rows, int positions)
        : width((positions + lane - 1) / lane * lane), re(static_cast<std::size_t>(rows) * width), im(re.size()) {}
    std::size_t at(int row) const { return static_cast<std::size_t>(row) * width; }
};

/// Incident coefficients of one target for sources at ring points + offset: rows -order .. order from `row` on.
void illuminate(const Ring& ring, double offset, int positions, const Scatterer& target, const Host& host,
                const Spectra& spectra, int count, int row, Transform& transform, Rows& out) {
    const std::size_t n = static_cast<std::size_t>(count), size = static_cast<std::size_t>(ring.size);
    std::vector<Cx> down(n), up(n), phase(n), E(n), Q(n), P(n, Cx{1.0}), R(n, Cx{1.0});
    const double x = ring.start + offset - target.x;
    const Cx inverse_k = Cx{1.0} / spectra.k;
    for (std::size_t i = 0; i < n; ++i) {
        const double kx = static_cast<double>(i) * spectra.spacing;
        const Cx kz = spectra.kz[i];
        down[i] = (spectra.spacing * (i == 0 ? 0.5 : 1.0)) * spectra.down[i];
        if (!host.endless()) up[i] = down[i] * spectra.below[i] * spectra.pass[i] * travel(kz, target.below);
        down[i] = down[i] * travel(kz, target.above);
        phase[i] = {std::cos(kx * x), std::sin(kx * x)};
        E[i] = (Cx{kx} + turn(kz)) * inverse_k;
        Q[i] = (Cx{kx} - turn(kz)) * inverse_k;
    }
    std::vector<Complex> bins(size), field(size);
    const int M = target.order();
    const auto send = [&](int order, const Cx scale, bool mirrored) {
        std::fill(bins.begin(), bins.end(), Complex{});
        const double sign = (order & 1) ? -1.0 : 1.0;
        for (std::size_t i = 0; i < n; ++i) {
            Cx a = down[i] * R[i] + up[i] * P[i], b = down[i] * P[i] + up[i] * R[i];
            if (mirrored) std::swap(a, b);
            bins[i] += Complex(scale * phase[i] * a);
            bins[i == 0 ? 0 : size - i] += Complex(sign * (scale * conj(phase[i]) * b));
        }
        transform.sum(bins.data(), field.data(), ring.size);
        const std::size_t to = out.at(row + M + order);
        for (int i = 0; i < positions; ++i) {
            const Complex value = field[static_cast<std::size_t>(i) % size];
            out.re[to + i] = value.real();
            out.im[to + i] = value.imag();
        }
    };
    constexpr Cx down_turns[4] = {{1, 0}, {0, -1}, {-1, 0}, {0, 1}};  // (-j)^n
    for (int order = 0; order <= M; ++order) {
        const Cx root = target.root[order], turned = down_turns[order & 3];
        send(order, root * turned, false);
        if (order > 0) send(-order, root * conj(turned), true);
        for (std::size_t i = 0; i < n; ++i) {
            P[i] = P[i] * E[i];
            R[i] = R[i] * Q[i];
        }
    }
}

}  // namespace

Ring ring_for(const Line& line, double widest) {
    const double coarsest = pi / (2.0 * widest * oversampling);
    Ring ring;
    ring.spacing = coarsest;
    if (!(line.separation > 0.0)) {
        ring.shift = 0;
    } else {
        const double steps = std::ceil(line.separation / coarsest);
        if (line.separation / steps > 0.6 * coarsest) {
            ring.spacing = line.separation / steps;
            ring.shift = static_cast<int>(steps);
        }
    }
    const double span = line.step * (line.traces - 1);
    ring.start = line.first - (taps / 2) * ring.spacing;
    ring.used = static_cast<int>(std::ceil(span / ring.spacing)) + taps + 1;
    ring.size = fast_length(std::max(static_cast<int>(std::ceil(line.period / ring.spacing)), ring.used));
    return ring;
}

std::vector<Complex> echo_on(const Ring& ring, const Line& line, const std::vector<Scatterer>& targets,
                             const Host& host, const Spectra& spectra, int count, const std::vector<Complex>& joint,
                             Transform& transform) {
    int rows = 0;
    for (const Scatterer& target : targets) rows += target.size();
    const bool own = ring.shift < 0;
    const int positions = ring.used + (own ? 0 : ring.shift);
    Rows a(rows, positions + lane), own_g(own ? rows : 0, own ? ring.used + lane : 0);
    int row = 0;
    for (const Scatterer& target : targets) {
        illuminate(ring, -0.5 * line.separation, positions, target, host, spectra, count, row, transform, a);
        if (own)
            illuminate(ring, 0.5 * line.separation, ring.used, target, host, spectra, count, row, transform, own_g);
        row += target.size();
    }
    const Rows& g = own ? own_g : a;
    const std::size_t shift = own ? 0 : static_cast<std::size_t>(ring.shift);
    std::vector<int> partner(static_cast<std::size_t>(rows));  // row of g that meets row i of T a, order turned round
    std::vector<double> sign(static_cast<std::size_t>(rows));
    row = 0;
    for (const Scatterer& target : targets) {
        for (int i = 0; i < target.size(); ++i) {
            partner[row + i] = row + target.size() - 1 - i;
            sign[row + i] = ((i - target.order()) & 1) ? -1.0 : 1.0;
        }
        row += target.size();
    }
    std::vector<Complex> out(static_cast<std::size_t>(ring.used));
    for (int from = 0; from < ring.used; from += lane) {
        double sum_re[lane] = {}, sum_im[lane] = {};
        for (int i = 0; i < rows; ++i) {
            double re[lane] = {}, im[lane] = {};
            const Complex* t = joint.data() + static_cast<std::size_t>(i) * rows;
            for (int k = 0; k < rows; ++k) {
                const double t_re = t[k].real(), t_im = t[k].imag();
                const double* a_re = a.re.data() + a.at(k) + from;
                const double* a_im = a.im.data() + a.at(k) + from;
                for (int p = 0; p < lane; ++p) {
                    re[p] += t_re * a_re[p] - t_im * a_im[p];
                    im[p] += t_re * a_im[p] + t_im * a_re[p];
                }
            }
            const double* g_re = g.re.data() + g.at(partner[i]) + from + shift;
            const double* g_im = g.im.data() + g.at(partner[i]) + from + shift;
            for (int p = 0; p < lane; ++p) {
                sum_re[p] += sign[i] * (g_re[p] * re[p] - g_im[p] * im[p]);
                sum_im[p] += sign[i] * (g_re[p] * im[p] + g_im[p] * re[p]);
            }
        }
        for (int p = 0; p < lane && from + p < ring.used; ++p) out[from + p] = {sum_re[p], sum_im[p]};
    }
    return out;
}

void onto_traces(const Ring& ring, const Line& line, const std::vector<Complex>& values, Complex factor, Complex* out,
                 std::size_t stride) {
    constexpr double half = taps / 2, shape = pi * half * (1.0 - 1.0 / oversampling);
    for (int trace = 0; trace < line.traces; ++trace) {
        const double at = (line.first + trace * line.step - ring.start) / ring.spacing;
        const int left = static_cast<int>(at);
        const double part = at - left;
        const double wave = std::sin(pi * part) / pi;
        Complex sum = 0.0;
        for (int tap = 1 - taps / 2; tap <= taps / 2; ++tap) {
            const double d = part - tap, inside = 1.0 - d * d / (half * half);
            if (!(inside > 0.0)) continue;
            const double sinc = std::fabs(d) < 1e-9 ? 1.0 : ((tap & 1) ? -wave : wave) / d;
            sum += sinc * std::exp(shape * (std::sqrt(inside) - 1.0)) * values[left + tap];
        }
        out[static_cast<std::size_t>(trace) * stride] += factor * sum;
    }
}

}  // namespace gg
