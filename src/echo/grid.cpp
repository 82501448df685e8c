#include "echo/grid.hpp"

#include <Eigen/Core>
#include <algorithm>
#include <cmath>

namespace gg {
namespace {

constexpr double oversampling = 1.35;
constexpr int taps = 16;

/// Rows of positions, real and imaginary parts apart so that the compiler can work on several positions at once.
constexpr int lane = 8;
struct Rows {
    int width = 0;
    std::vector<double> re, im;
    Rows(int rows, int positions)
        : width((positions + lane - 1) / lane * lane), re(static_cast<std::size_t>(rows) * width), im(re.size()) {}
    std::size_t at(int row) const { return static_cast<std::size_t>(row) * width; }
    /// Largest magnitude of each row, from every third position.
    std::vector<double> strongest() const {
        std::vector<double> out;
        for (std::size_t from = 0; from < re.size(); from += width) {
            double most = 0.0;
            for (int i = 0; i < width; i += 3)
                most = std::max(most, re[from + i] * re[from + i] + im[from + i] * im[from + i]);
            out.push_back(std::sqrt(most));
        }
        return out;
    }
};

/// Incident coefficients of one target for sources at grid points + offset: rows -order .. order from `row` on.
/// With alpha and beta the spectra of order n at +kx and, but for (-1)^n, at -kx:
///   a_n, a_-n = (-j)^n (C +- S),  C = sum (alpha + (-1)^n beta) cos kx x,  S = j sum (alpha - (-1)^n beta) sin kx x.
void illuminate(const Grid& grid, double offset, int positions, const Scatterer& target, const Host& host,
                const Spectra& spectra, int count, int row, Rows& out) {
    using Matrix = Eigen::MatrixXd;
    const int M = target.order();
    Matrix cosine(positions, count), sine(positions, count), even(count, 2 * M + 2), odd(count, 2 * M + 2);
    const double x = grid.start + offset - target.x;
    Eigen::ArrayXd turn_re(positions), turn_im(positions);
    for (int i = 0; i < positions; ++i) {
        const double angle = spectra.spacing * (x + i * grid.spacing);
        turn_re[i] = std::cos(angle);
        turn_im[i] = std::sin(angle);
    }
    cosine.col(0).setOnes();
    sine.col(0).setZero();
    for (int k = 1; k < count; ++k) {
        cosine.col(k).array() = cosine.col(k - 1).array() * turn_re - sine.col(k - 1).array() * turn_im;
        sine.col(k).array() = sine.col(k - 1).array() * turn_re + cosine.col(k - 1).array() * turn_im;
    }
    const Cx inverse_k = Cx{1.0} / spectra.k;
    for (int k = 0; k < count; ++k) {
        const std::size_t at = static_cast<std::size_t>(k);
        const double kx = k * spectra.spacing;
        const Cx kz = spectra.kz[at], sent = (spectra.spacing * (k == 0 ? 0.5 : 1.0)) * spectra.down[at];
        const Cx down = sent * target.to_top[at];
        const Cx up = host.endless() ? Cx{} : sent * spectra.below[at] * spectra.pass[at] * target.to_bottom[at];
        const Cx E = (Cx{kx} + turn(kz)) * inverse_k, E_inverse = (Cx{kx} - turn(kz)) * inverse_k;
        Cx P{1.0}, Q{1.0};
        double sign = 1.0;
        for (int n = 0; n <= M; ++n, P = P * E, Q = Q * E_inverse, sign = -sign) {
            const Cx alpha = down * Q + up * P, beta = sign * (down * P + up * Q), sum = alpha + beta,
                     difference = turn(alpha - beta);
            even(k, 2 * n) = sum.re;
            even(k, 2 * n + 1) = sum.im;
            odd(k, 2 * n) = difference.re;
            odd(k, 2 * n + 1) = difference.im;
        }
    }
    const Matrix C = cosine * even, S = sine * odd;
    Cx turned{1.0};
    for (int n = 0; n <= M; ++n, turned = -turn(turned)) {
        const Cx scale = Cx{target.root[static_cast<std::size_t>(n)]} * turned;
        for (const int side : {1, -1}) {
            const std::size_t to = out.at(row + M + side * n);
            for (int i = 0; i < positions; ++i) {
                const Cx value = scale * Cx{C(i, 2 * n) + side * S(i, 2 * n), C(i, 2 * n + 1) + side * S(i, 2 * n + 1)};
                out.re[to + i] = value.re;
                out.im[to + i] = value.im;
            }
        }
    }
}

}  // namespace

Grid grid_for(const Line& line, double widest) {
    const double coarsest = pi / (2.0 * widest * oversampling);
    Grid grid;
    grid.spacing = coarsest;
    if (!(line.separation > 0.0)) {
        grid.shift = 0;
    } else {
        const double steps = std::ceil(line.separation / coarsest);
        if (line.separation / steps > 0.6 * coarsest) {
            grid.spacing = line.separation / steps;
            grid.shift = static_cast<int>(steps);
        }
    }
    const double span = line.step * (line.traces - 1);
    grid.start = line.first - (taps / 2) * grid.spacing;
    grid.size = static_cast<int>(std::ceil(span / grid.spacing)) + taps + 1;
    return grid;
}

std::vector<Complex> echo_on(const Grid& grid, const Line& line, const std::vector<Scatterer>& targets,
                             const Host& host, const Spectra& spectra, int count, const std::vector<Complex>& joint,
                             double share) {
    int rows = 0;
    for (const Scatterer& target : targets) rows += target.size();
    const bool own = grid.shift < 0;
    const int positions = grid.size + (own ? 0 : grid.shift);
    Rows a(rows, positions + lane), own_g(own ? rows : 0, own ? grid.size + lane : 0);
    int row = 0;
    for (const Scatterer& target : targets) {
        illuminate(grid, -0.5 * line.separation, positions, target, host, spectra, count, row, a);
        if (own) illuminate(grid, 0.5 * line.separation, grid.size, target, host, spectra, count, row, own_g);
        row += target.size();
    }
    const Rows& g = own ? own_g : a;
    const std::size_t shift = own ? 0 : static_cast<std::size_t>(grid.shift);
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
    // The parts of T that count, by what stands on either side of them at its strongest.
    const std::vector<double> a_most = a.strongest(), g_most = g.strongest();
    double most = 0.0;
    for (int i = 0; i < rows * rows; ++i)
        most = std::max(most, std::abs(joint[i]) * g_most[partner[i / rows]] * a_most[i % rows]);
    struct Part {
        int column;
        double re, im;
    };
    std::vector<std::vector<Part>> parts(static_cast<std::size_t>(rows));
    for (int i = 0; i < rows * rows; ++i) {
        if (!(std::abs(joint[i]) * g_most[partner[i / rows]] * a_most[i % rows] > 0.03 * share * most)) continue;
        parts[i / rows].push_back({i % rows, joint[i].real(), joint[i].imag()});
    }
    std::vector<Complex> out(static_cast<std::size_t>(grid.size));
    for (int from = 0; from < grid.size; from += lane) {
        double sum_re[lane] = {}, sum_im[lane] = {};
        for (int i = 0; i < rows; ++i) {
            double re[lane] = {}, im[lane] = {};
            if (parts[i].empty()) continue;
            for (const Part& part : parts[i]) {
                const double t_re = part.re, t_im = part.im;
                const double* a_re = a.re.data() + a.at(part.column) + from;
                const double* a_im = a.im.data() + a.at(part.column) + from;
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
        for (int p = 0; p < lane && from + p < grid.size; ++p) out[from + p] = {sum_re[p], sum_im[p]};
    }
    return out;
}

void onto_traces(const Grid& grid, const Line& line, const std::vector<Complex>& values, Complex factor, Complex* out,
                 std::size_t stride) {
    constexpr double half = taps / 2, shape = pi * half * (1.0 - 1.0 / oversampling);
    for (int trace = 0; trace < line.traces; ++trace) {
        const double at = (line.first + trace * line.step - grid.start) / grid.spacing;
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
