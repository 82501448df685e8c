#include "echo/coupling.hpp"

#include <algorithm>
#include <cmath>

#include "echo/cylinder_functions.hpp"

namespace gg {
namespace {

/// straight = sum P p + Q q, crossed = sum P q + Q p.
void sums(const Pairs& P, const Pairs& Q, const Pairs& p, const Pairs& q, Cx& straight, Cx& crossed) {
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

/// The same where p = sign * q, as it is straight below: both sums are (sign P + Q) q but for the sign.
void sums_below(const Pairs& P, const Pairs& Q, const Pairs& q, double sign, Cx& straight, Cx& crossed) {
    Two re{}, im{};
    for (std::size_t i = 0; i < P.size(); ++i) {
        const Two br = sign * P.re[i] + Q.re[i], bi = sign * P.im[i] + Q.im[i];
        re += br * q.re[i] - bi * q.im[i];
        im += br * q.im[i] + bi * q.re[i];
    }
    straight = {re[0] + re[1], im[0] + im[1]};
    crossed = sign * straight;
}

void go_on(Pairs& a, const Pairs& by) {
    for (std::size_t i = 0; i < a.size(); ++i) {
        const Two re = a.re[i] * by.re[i] - a.im[i] * by.im[i];
        a.im[i] = a.re[i] * by.im[i] + a.im[i] * by.re[i];
        a.re[i] = re;
    }
}

/// Paths straight from one target to another: (-j)^s H_s(k d) exp(j s angle), s from -reach to reach; zeros for itself.
std::vector<Cx> straight_paths(const Scatterer& to, const Scatterer& from, Cx k, int reach) {
    std::vector<Cx> out(2 * static_cast<std::size_t>(reach) + 1);
    const double dx = to.x - from.x, dz = to.level->above - from.level->above, d = std::hypot(dx, dz);
    if (!(d > 0.0)) return out;
    const CylinderFunctions f = cylinder_functions(Complex(k) * d, reach);
    const Cx step = -turn(Cx{dx / d, dz / d});
    Cx turned{1.0};
    for (int s = 0; s <= reach; ++s, turned = turned * step) {
        out[reach + s] = Cx{f.h[s]} * turned;
        out[reach - s] = ((s & 1) ? -1.0 : 1.0) * (Cx{f.h[s]} * conj(turned));  // H_-s = (-1)^s H_s
    }
    return out;
}

/// Row of the standing wave of order n: the cosine's, or the sine's (n > 0).
int cosine_row(int n) { return n == 0 ? 0 : 2 * n - 1; }
int sine_row(int n) { return 2 * n; }

/// Takes what leads from one target to another (or itself) from the block of 1 - C at `corner`.
void take_block(Cx* corner, int stride, const Scatterer& to, const Scatterer& from, Cx k, const Paths& by) {
    const int reach = to.order() + from.order();
    const std::vector<Cx> straight = straight_paths(to, from, k, reach);
    // p(n, m): from the travelling wave of order n to that of order m, but for j^(n - m).
    const auto p = [&](int n, int m) {
        return by.odd[by.reach + n + m] + by.even[by.reach + n - m] + straight[reach + n - m];
    };
    for (int m = 0; m <= to.order(); ++m) {
        for (int n = 0; n <= from.order(); ++n) {
            const double n_sign = (n & 1) ? -1.0 : 1.0, m_sign = (m & 1) ? -1.0 : 1.0;
            const Cx a = p(n, m), b = n_sign * p(-n, m), c = m_sign * p(n, -m), d = (n_sign * m_sign) * p(-n, -m);
            const Cx scale = -0.25 * (to.strength[m] * from.strength[n]);
            Cx* const cosine = corner + static_cast<std::ptrdiff_t>(cosine_row(m)) * stride;
            Cx* const sine = corner + static_cast<std::ptrdiff_t>(sine_row(m)) * stride;
            cosine[cosine_row(n)] += scale * (a + b + c + d);
            if (n > 0) cosine[sine_row(n)] += -turn(scale * (a - b + c - d));
            if (m > 0) sine[cosine_row(n)] += turn(scale * (a + b - c - d));
            if (n > 0 && m > 0) sine[sine_row(n)] += scale * (a - b - c + d);
        }
    }
}

}  // namespace

Level level_at(double above, double below, const Host& host, const Spectra& spectra, int count) {
    Level level{above, below, {}, {}};
    for (std::size_t i = 0; i < static_cast<std::size_t>(count); ++i) {
        level.to_top.push_back(travel(spectra.kz[i], above));
        if (!host.endless()) level.to_bottom.push_back(travel(spectra.kz[i], below));
    }
    return level;
}

Directions::Directions(const Spectra& spectra, int count) : up(count), down(count) {
    const Cx inverse_k = Cx{1.0} / spectra.k;
    for (int i = 0; i < count; ++i) {
        const Cx kx{i * spectra.spacing}, kz = spectra.kz[static_cast<std::size_t>(i)];
        up.set(i, (kx + turn(kz)) * inverse_k);
        down.set(i, (kx - turn(kz)) * inverse_k);
    }
}

Paths::Paths(const Level& to, const Level& from, double x, int reach_, const Host& host, const Spectra& spectra,
             const Directions& directions, int count)
    : reach(reach_), odd(2 * static_cast<std::size_t>(reach) + 1), even(odd.size()) {
    const double scale = spectra.spacing / pi;
    const bool below = x == 0.0 && to.above == from.above;
    // Weights of E^-s and of E^s, [0] for even s, [1] for odd s: what goes with kx and, in turn, what goes with -kx.
    Pairs odd_Q[2]{Pairs(count), Pairs(count)}, odd_P[2]{Pairs(count), Pairs(count)};
    Pairs even_Q[2]{Pairs(count), Pairs(count)}, even_P[2]{Pairs(count), Pairs(count)};
    const Cx phase_step{std::cos(spectra.spacing * x), -std::sin(spectra.spacing * x)};
    Cx phase{1.0};
    for (int i = 0; i < count; ++i, phase = phase * phase_step) {
        const std::size_t at = static_cast<std::size_t>(i);
        const Cx kz = spectra.kz[at], U = spectra.above[at];
        const Cx front = (scale * (i == 0 ? 0.5 : 1.0)) * (Cx{1.0} / kz);  // +kx and -kx are one point at 0
        Cx up = front * U * from.to_top[at] * to.to_top[at], down, up_down, down_up;
        if (!host.endless()) {
            const Cx D = spectra.below[at], e = spectra.pass[at];
            const Cx round = Cx{1.0} / (Cx{1.0} - U * D * e * e), both = front * U * D * e * round;
            up = up * round;
            down = front * D * round * from.to_bottom[at] * to.to_bottom[at];
            down_up = both * from.to_bottom[at] * to.to_top[at];
            up_down = both * from.to_top[at] * to.to_bottom[at];
        }
        const Cx back = conj(phase);
        for (const int s : {0, 1}) {
            const double sign = s == 0 ? 1.0 : -1.0;
            odd_Q[s].set(i, phase * up + sign * (back * down));
            even_Q[s].set(i, phase * up_down + sign * (back * down_up));
            if (below) continue;
            odd_P[s].set(i, phase * down + sign * (back * up));
            even_P[s].set(i, phase * down_up + sign * (back * up_down));
        }
    }
    Pairs P(count), Q(count);
    std::fill(P.re.begin(), P.re.end(), Two{1.0, 1.0});
    Q = P;
    for (int s = 0; s <= reach; ++s) {
        const auto add = [&](const Pairs(&p)[2], const Pairs(&q)[2], std::vector<Cx>& out) {
            if (below)
                sums_below(P, Q, q[s & 1], s & 1 ? -1.0 : 1.0, out[reach + s], out[reach - s]);
            else
                sums(P, Q, p[s & 1], q[s & 1], out[reach + s], out[reach - s]);
        };
        add(odd_P, odd_Q, odd);
        if (!host.endless()) add(even_P, even_Q, even);
        go_on(P, directions.up);
        go_on(Q, directions.down);
    }
}

std::vector<Cx> couple(const std::vector<Scatterer>& targets, const std::vector<const Paths*>& own, const Host& host,
                       const Spectra& spectra, const Directions& directions, int count) {
    int size = 0;
    for (const Scatterer& target : targets) size += target.rows();
    std::vector<Cx> G(static_cast<std::size_t>(size) * size);
    int row = 0;
    for (std::size_t q = 0; q < targets.size(); row += targets[q++].rows()) {
        int column = 0;
        for (std::size_t p = 0; p < q; column += targets[p++].rows()) {
            const Paths between(*targets[q].level, *targets[p].level, targets[q].x - targets[p].x,
                                targets[q].order() + targets[p].order(), host, spectra, directions, count);
            take_block(&G[static_cast<std::size_t>(row) * size + column], size, targets[q], targets[p], spectra.k,
                       between);
        }
        take_block(&G[static_cast<std::size_t>(row) * size + row], size, targets[q], targets[q], spectra.k, *own[q]);
    }
    // Cholesky's scheme without conjugates, row by row.
    for (int i = 0; i < size; ++i) {
        Cx* const at = &G[static_cast<std::size_t>(i) * size];
        for (int j = 0; j <= i; ++j) {
            const Cx* const other = &G[static_cast<std::size_t>(j) * size];
            Cx sum = i == j ? at[j] + Cx{1.0} : at[j];
            for (int k = 0; k < j; ++k) sum += -(at[k] * other[k]);
            at[j] = i == j ? Cx{std::sqrt(Complex(sum))} : sum / other[j];
        }
    }
    return G;
}

}  // namespace gg
