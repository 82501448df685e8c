#include "echo/coupling.hpp"

#include <Eigen/LU>
#include <algorithm>
#include <cmath>
#include <optional>

#include "echo/cylinder_functions.hpp"

namespace gg {
namespace {

/// Single precision: entries are near one, and four to five digits are wanted.
using Matrix = Eigen::Matrix<std::complex<float>, Eigen::Dynamic, Eigen::Dynamic, Eigen::RowMajor>;

Complex power_of_j(int n) {
    constexpr Complex powers[4] = {{1, 0}, {0, 1}, {-1, 0}, {0, -1}};
    return powers[n & 3];
}

/// Real and imaginary parts apart, in pairs: sums over kx are what the coupling costs.
using Two [[gnu::vector_size(16)]] = double;
struct Pairs {
    std::vector<Two> re, im;
    explicit Pairs(int count) : re(static_cast<std::size_t>(count + 1) / 2), im(re.size()) {}
    void set(int i, Cx value) {
        re[static_cast<std::size_t>(i) / 2][i & 1] = value.re;
        im[static_cast<std::size_t>(i) / 2][i & 1] = value.im;
    }
    std::size_t size() const { return re.size(); }
};

/// What every pair of targets meets at each kx: E = exp(j phi) = (kx + j kz)/k and its inverse, which at -kx change
/// places and sign.
struct Directions {
    Pairs up, down;
    Directions(const Spectra& spectra, int count) : up(count), down(count) {
        const Cx inverse_k = Cx{1.0} / spectra.k;
        for (int i = 0; i < count; ++i) {
            const Cx kx{i * spectra.spacing}, kz = spectra.kz[static_cast<std::size_t>(i)];
            up.set(i, (kx + turn(kz)) * inverse_k);
            down.set(i, (kx - turn(kz)) * inverse_k);
        }
    }
};

/// Paths from target p to target q by the boundaries: sums over kx that depend on n + m (an odd number of reflections)
/// or on n - m (an even one) alone. Both indexed from -reach to reach.
struct ByBoundaries {
    int reach;
    std::vector<Cx> odd, even;

    ByBoundaries(const Scatterer& q, const Scatterer& p, const Host& host, const Spectra& spectra,
                 const Directions& directions, int count)
        : reach(q.order() + p.order()), odd(2 * static_cast<std::size_t>(reach) + 1), even(odd.size()) {
        const double x = q.x - p.x, scale = spectra.spacing / pi;
        // Weights of E^-s and of E^s, [0] for even s, [1] for odd s: what goes with kx and, in turn, what goes with
        // -kx.
        Pairs odd_Q[2]{Pairs(count), Pairs(count)}, odd_P[2]{Pairs(count), Pairs(count)};
        Pairs even_Q[2]{Pairs(count), Pairs(count)}, even_P[2]{Pairs(count), Pairs(count)};
        const Cx phase_step{std::cos(spectra.spacing * x), -std::sin(spectra.spacing * x)};
        Cx phase{1.0};
        for (int i = 0; i < count; ++i, phase = phase * phase_step) {
            const std::size_t at = static_cast<std::size_t>(i);
            const Cx kz = spectra.kz[at], U = spectra.above[at];
            const Cx front = (scale * (i == 0 ? 0.5 : 1.0)) * (Cx{1.0} / kz);  // +kx and -kx are one point at 0
            Cx up = front * U * p.to_top[at] * q.to_top[at], down, up_down, down_up;
            if (!host.endless()) {
                const Cx D = spectra.below[at], e = spectra.pass[at];
                const Cx round = Cx{1.0} / (Cx{1.0} - U * D * e * e), both = front * U * D * e * round;
                up = up * round;
                down = front * D * round * p.to_bottom[at] * q.to_bottom[at];
                down_up = both * p.to_bottom[at] * q.to_top[at];
                up_down = both * p.to_top[at] * q.to_bottom[at];
            }
            const Cx back = conj(phase);
            for (const int s : {0, 1}) {
                const double sign = s == 0 ? 1.0 : -1.0;
                odd_Q[s].set(i, phase * up + sign * (back * down));
                odd_P[s].set(i, phase * down + sign * (back * up));
                if (host.endless()) continue;
                even_P[s].set(i, phase * down_up + sign * (back * up_down));
                even_Q[s].set(i, phase * up_down + sign * (back * down_up));
            }
        }
        Pairs P(count), Q(count);
        std::fill(P.re.begin(), P.re.end(), Two{1.0, 1.0});
        Q = P;
        for (int s = 0; s <= reach; ++s) {
            sums(P, Q, odd_P[s & 1], odd_Q[s & 1], odd[reach + s], odd[reach - s]);
            if (!host.endless()) sums(P, Q, even_P[s & 1], even_Q[s & 1], even[reach + s], even[reach - s]);
            go_on(P, directions.up);
            go_on(Q, directions.down);
        }
    }
    Complex path(int n, int m) const {
        return odd[static_cast<std::size_t>(n + m + reach)] + even[static_cast<std::size_t>(n - m + reach)];
    }

  private:
    /// straight = sum P p + Q q, crossed = sum P q + Q p.
    static void sums(const Pairs& P, const Pairs& Q, const Pairs& p, const Pairs& q, Cx& straight, Cx& crossed) {
        Two s_re{}, s_im{}, c_re{}, c_im{};
        for (std::size_t i = 0; i < P.size(); ++i) {
            const Two Pr = P.re[i], Pi = P.im[i], Qr = Q.re[i], Qi = Q.im[i], pr = p.re[i], pi_ = p.im[i], qr = q.re[i],
                      qi = q.im[i];
            s_re += Pr * pr - Pi * pi_ + (Qr * qr - Qi * qi);
            s_im += Pr * pi_ + Pi * pr + (Qr * qi + Qi * qr);
            c_re += Pr * qr - Pi * qi + (Qr * pr - Qi * pi_);
            c_im += Pr * qi + Pi * qr + (Qr * pi_ + Qi * pr);
        }
        straight = {s_re[0] + s_re[1], s_im[0] + s_im[1]};
        crossed = {c_re[0] + c_re[1], c_im[0] + c_im[1]};
    }
    static void go_on(Pairs& a, const Pairs& by) {
        for (std::size_t i = 0; i < a.size(); ++i) {
            const Two re = a.re[i] * by.re[i] - a.im[i] * by.im[i];
            a.im[i] = a.re[i] * by.im[i] + a.im[i] * by.re[i];
            a.re[i] = re;
        }
    }
};

/// Fills the block of C that leads from p to q, and by reciprocity the one that leads back.
void fill(Matrix& C, int row, int column, const Scatterer& q, const Scatterer& p, const Spectra& spectra,
          const ByBoundaries& by) {
    const bool same = row == column;
    const double dx = q.x - p.x, dz = q.above - p.above, d = std::hypot(dx, dz);
    const int reach = q.order() + p.order();
    CylinderFunctions f;
    if (!same) f = cylinder_functions(Complex(spectra.k) * d, reach);
    const Complex turned = same ? Complex{1.0} : Complex{dx, dz} / d;
    std::vector<Complex> turns(static_cast<std::size_t>(reach) + 1, 1.0);
    for (int s = 1; s <= reach; ++s) turns[s] = turns[s - 1] * turned;
    const int M = q.order(), N = p.order();
    for (int m = -M; m <= M; ++m) {
        for (int n = -N; n <= N; ++n) {
            Complex path = power_of_j(n - m) * by.path(n, m);
            if (!same) {
                const int s = n - m, size = std::abs(s);
                const double sign = s < 0 && (size & 1) ? -1.0 : 1.0;  // H_-s = (-1)^s H_s
                path += sign * f.h[size] * (s < 0 ? std::conj(turns[size]) : turns[size]);
            }
            const Complex value = q.root[std::abs(m)] * path * p.root[std::abs(n)];
            C(row + M + m, column + N + n) = std::complex<float>(value);
            if (!same) C(column + N - n, row + M - m) = std::complex<float>(((n + m) & 1) ? -value : value);
        }
    }
}

}  // namespace

std::vector<Complex> joint_answer(const std::vector<Scatterer>& targets, const Host& host, const Spectra& spectra,
                                  int count) {
    int size = 0;
    for (const Scatterer& target : targets) size += target.size();
    Matrix C(size, size);
    const Directions directions(spectra, count);
    std::optional<ByBoundaries> own, between;
    int row = 0;
    for (std::size_t q = 0; q < targets.size(); row += targets[q++].size()) {
        int column = 0;
        for (std::size_t p = 0; p <= q; column += targets[p++].size()) {
            // Its own images are the same for all at one depth.
            const bool again = p == q && q > 0 && targets[q].above == targets[q - 1].above &&
                               targets[q].order() == targets[q - 1].order();
            std::optional<ByBoundaries>& by = p == q ? own : between;
            if (!again) by.emplace(targets[q], targets[p], host, spectra, directions, count);
            fill(C, row, column, targets[q], targets[p], spectra, *by);
        }
    }
    const Matrix T = (Matrix::Identity(size, size) - C).partialPivLu().inverse();
    return {T.data(), T.data() + T.size()};
}

}  // namespace gg
