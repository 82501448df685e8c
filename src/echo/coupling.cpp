#include "echo/coupling.hpp"

#include <Eigen/LU>
#include <cmath>

#include "echo/cylinder_functions.hpp"

namespace gg {
namespace {

using Matrix = Eigen::Matrix<Complex, Eigen::Dynamic, Eigen::Dynamic, Eigen::RowMajor>;

Complex power_of_j(int n) {
    constexpr Complex powers[4] = {{1, 0}, {0, 1}, {-1, 0}, {0, -1}};
    return powers[n & 3];
}

/// Paths from target p to target q by the boundaries: sums over kx that depend on n + m (an odd number of reflections)
/// or on n - m (an even one) alone. Both indexed from -reach to reach.
struct ByBoundaries {
    int reach;
    std::vector<Cx> odd, even;

    ByBoundaries(const Scatterer& q, const Scatterer& p, const Host& host, const Spectra& spectra, int count)
        : reach(q.order() + p.order()), odd(2 * static_cast<std::size_t>(reach) + 1), even(odd.size()) {
        const double x = q.x - p.x, scale = spectra.spacing / pi;
        const Cx inverse_k = Cx{1.0} / spectra.k;
        Cx* const odd0 = odd.data() + reach;
        Cx* const even0 = even.data() + reach;
        for (std::size_t at = 0; at < static_cast<std::size_t>(count); ++at) {
            const double kx = static_cast<double>(at) * spectra.spacing;
            const Cx kz = spectra.kz[at], U = spectra.above[at];
            const Cx front = (scale * (at == 0 ? 0.5 : 1.0)) * (Cx{1.0} / kz);  // +kx and -kx are one point at 0
            Cx up = front * U * p.to_top[at] * q.to_top[at], down, up_down, down_up;
            if (!host.endless()) {
                const Cx D = spectra.below[at], e = spectra.pass[at];
                const Cx round = Cx{1.0} / (Cx{1.0} - U * D * e * e), both = front * U * D * e * round;
                up = up * round;
                down = front * D * round * p.to_bottom[at] * q.to_bottom[at];
                down_up = both * p.to_bottom[at] * q.to_top[at];
                up_down = both * p.to_top[at] * q.to_bottom[at];
            }
            const Cx phase{std::cos(kx * x), -std::sin(kx * x)};
            // E = exp(j phi) = (kx + j kz)/k and its inverse; at -kx they change places and sign.
            const Cx E = (Cx{kx} + turn(kz)) * inverse_k, E_inverse = (Cx{kx} - turn(kz)) * inverse_k;
            Cx P{1.0}, Q{1.0};
            double sign = 1.0;
            for (int s = 0; s <= reach; ++s, P = P * E, Q = Q * E_inverse, sign = -sign) {
                const Cx a = up * Q + down * P, b = up * P + down * Q;
                const Cx a_back = sign * conj(phase) * b, b_back = sign * conj(phase) * a;
                odd0[s] += phase * a + a_back;
                if (s > 0) odd0[-s] += phase * b + b_back;
                if (host.endless()) continue;
                const Cx c = down_up * P + up_down * Q, d = down_up * Q + up_down * P;
                even0[s] += phase * c + sign * conj(phase) * d;
                if (s > 0) even0[-s] += phase * d + sign * conj(phase) * c;
            }
        }
    }
    Complex path(int n, int m) const {
        return odd[static_cast<std::size_t>(n + m + reach)] + even[static_cast<std::size_t>(n - m + reach)];
    }
};

/// Fills the block of C that leads from p to q, and by reciprocity the one that leads back.
void fill(Matrix& C, int row, int column, const Scatterer& q, const Scatterer& p, const Host& host,
          const Spectra& spectra, int count) {
    const ByBoundaries by(q, p, host, spectra, count);
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
            C(row + M + m, column + N + n) = value;
            if (!same) C(column + N - n, row + M - m) = ((n + m) & 1) ? -value : value;
        }
    }
}

}  // namespace

std::vector<Complex> joint_answer(const std::vector<Scatterer>& targets, const Host& host, const Spectra& spectra,
                                  int count) {
    int size = 0;
    for (const Scatterer& target : targets) size += target.size();
    Matrix C(size, size);
    int row = 0;
    for (std::size_t q = 0; q < targets.size(); row += targets[q++].size()) {
        int column = 0;
        for (std::size_t p = 0; p <= q; column += targets[p++].size())
            fill(C, row, column, targets[q], targets[p], host, spectra, count);
    }
    const Matrix T = (Matrix::Identity(size, size) - C).partialPivLu().inverse();
    return {T.data(), T.data() + T.size()};
}

}  // namespace gg
