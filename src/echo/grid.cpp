#include "echo/grid.hpp"

namespace gg {
namespace {

constexpr int taps = Grid::taps;
constexpr double oversampling = 1.5;
constexpr int enough_ahead = 4;  // from here on a whole number of spacings is at most a quarter finer than needed
constexpr double octave_steps = 12.0;

Eight load(const float* from) { return Eight::load(from); }

/// Windowed-sinc weights of the points floor - 7 .. floor + 8 for a place `part` (0..1) past the floor.
Grid::Weights weights(double part) {
    constexpr double half = taps / 2, shape = pi * half * (1.0 - 1.0 / oversampling);
    const double wave = std::sin(pi * part) / pi;
    Grid::Weights out{};
    for (int i = 0; i < taps; ++i) {
        const int tap = i + 1 - taps / 2;
        const double d = part - tap, inside = 1.0 - d * d / (half * half);
        if (!(inside > 0.0)) continue;
        const double sinc = std::fabs(d) < 1e-9 ? 1.0 : ((tap & 1) ? -wave : wave) / d;
        out[i] = static_cast<float>(sinc * std::exp(shape * (std::sqrt(inside) - 1.0)));
    }
    return out;
}

/// The same for many places, between entries of a table: linear in 1/512 of a point is good to 5e-6.
Grid::Weights quick_weights(double part) {
    constexpr int count = 512;
    struct All {
        std::array<Grid::Weights, count + 1> at;
        All() {
            for (int i = 0; i <= count; ++i) at[i] = weights(static_cast<double>(i) / count);
        }
    };
    static const All all;
    const int low = std::min(static_cast<int>(part * count), count - 1);
    const float rest = static_cast<float>(part * count - low);
    Grid::Weights out;
    for (int t = 0; t < taps; ++t) out[t] = all.at[low][t] + rest * (all.at[low + 1][t] - all.at[low][t]);
    return out;
}

/// cos and sin of kx d at d = i * spacing, a row per kx.
Rows waves(double spacing, int distances, double dk, int count) {
    Rows out(count, distances);
    const std::size_t n = static_cast<std::size_t>(out.width);
    std::vector<double> turn_re(n), turn_im(n), re(n, 1.0), im(n, 0.0);
    for (std::size_t i = 0; i < n; ++i) {
        turn_re[i] = std::cos(dk * spacing * static_cast<double>(i));
        turn_im[i] = std::sin(dk * spacing * static_cast<double>(i));
    }
    for (int k = 0; k < count; ++k) {
        float* const to_re = out.re.data() + out.at(k);
        float* const to_im = out.im.data() + out.at(k);
        for (std::size_t i = 0; i < n; ++i) {
            to_re[i] = static_cast<float>(re[i]);
            to_im[i] = static_cast<float>(im[i]);
            const double next = re[i] * turn_re[i] - im[i] * turn_im[i];
            im[i] = im[i] * turn_re[i] + re[i] * turn_im[i];
            re[i] = next;
        }
    }
    return out;
}

/// out[column][middle + i] = sum_k wave[k][i] * spectrum[k][column], and its mirror image (times `mirror`) at
/// middle - i; columns in fours.
void sum_waves(const Rows& wave, bool sine, const std::vector<float>& spectrum, int count, int columns, int middle,
               int width, std::vector<float>& out) {
    const float* const waves = (sine ? wave.im : wave.re).data();
    const float mirror = sine ? -1.0F : 1.0F;
    for (int column = 0; column < columns; column += 4) {
        for (int from = 0; from <= middle; from += lanes) {
            Eight sum[4] = {};
            for (int k = 0; k < count; ++k) {
                const Eight w = load(waves + wave.at(k) + from);
                const float* const s = spectrum.data() + static_cast<std::size_t>(k) * columns + column;
                for (int c = 0; c < 4; ++c) sum[c] += s[c] * w;
            }
            for (int c = 0; c < 4; ++c) {
                float* const to = out.data() + static_cast<std::size_t>(column + c) * width + middle;
                sum[c].store(to + from);
                for (int i = 0; i < lanes && from + i <= middle; ++i) to[-(from + i)] = mirror * sum[c][i];
            }
        }
    }
}

/// out[i] = sum_t weight[t] in[i + t].
void interpolate(const Grid::Weights& weight, const float* in, float* out, int width) {
    for (int from = 0; from < width; from += lanes) {
        Eight sum = weight[0] * load(in + from);
        for (int t = 1; t < taps; ++t) sum += weight[t] * load(in + from + t);
        sum.store(out + from);
    }
}

/// A place between the points of a row: whole points on, and weights for the rest.
struct Between {
    int skip;
    Grid::Weights weight;
    explicit Between(double place) : skip(static_cast<int>(std::floor(place))), weight(quick_weights(place - skip)) {}
};

/// Rows of G^-1 u on every second place, and which of them the echo needs.
class Illumination {
  public:
    Illumination(const Grid& grid, const Track& track, const std::vector<Scatterer>& targets,
                 const std::vector<const Table*>& tables, const std::vector<Cx>& G, double share)
        : grid_(grid), G_(G), share_(share) {
        for (const Scatterer& target : targets) size_ += target.rows();
        rows_ = Rows(size_, grid.places + lanes);
        t_ = Rows(1, grid.places + lanes);
        for (std::size_t q = 0; q < targets.size(); ++q) {
            const Table& table = *tables[q];
            const Between at((grid.first_place(track) - targets[q].x) / (2.0 * grid.spacing) + grid.middle + 1 -
                             taps / 2);
            for (int n = 0; n <= targets[q].order(); ++n) {
                add(table, table.cosines, n, at, targets[q].strength[n]);
                if (n > 0) add(table, table.sines, n, at, targets[q].strength[n]);
            }
        }
    }
    const Rows& rows() const { return rows_; }
    bool matters(int row) const { return most_[row] * most_[row] > 0.02 * share_ * largest_; }
    int size() const { return size_; }

  private:
    /// The next row: (strength * wave - sum_j G_ij b_j) / G_ii over the j that count.
    void add(const Table& table, const std::vector<float>& waves, int n, const Between& at, Cx strength) {
        const int i = static_cast<int>(most_.size());
        const float* const from = waves.data() + 2 * static_cast<std::size_t>(n) * table.width + at.skip;
        interpolate(at.weight, from, t_.re.data(), grid_.places);
        interpolate(at.weight, from + table.width, t_.im.data(), grid_.places);
        const Cx* const line = &G_[static_cast<std::size_t>(i) * size_];
        const Cx inverse = Cx{1.0} / line[i], own = strength * inverse;
        const double alone = std::sqrt(norm(own)) * t_.strongest(0, grid_.places);
        largest_ = std::max(largest_, alone * alone);
        parts_.clear();
        parts_.push_back({t_.re.data(), t_.im.data(), static_cast<float>(own.re), static_cast<float>(own.im)});
        for (int j = 0; j < i; ++j) {
            const Cx g = -(line[j] * inverse);
            if (std::sqrt(norm(g)) * most_[j] * std::max(alone, most_[j]) > 0.02 * share_ * largest_)
                parts_.push_back({rows_.re.data() + rows_.at(j), rows_.im.data() + rows_.at(j),
                                  static_cast<float>(g.re), static_cast<float>(g.im)});
        }
        float* const to_re = rows_.re.data() + rows_.at(i);
        float* const to_im = rows_.im.data() + rows_.at(i);
        for (int k = 0; k < grid_.places; k += lanes) {
            Eight re{}, im{};
            for (const Part& part : parts_) {
                const Eight b_re = load(part.re + k), b_im = load(part.im + k);
                re += part.by_re * b_re - part.by_im * b_im;
                im += part.by_re * b_im + part.by_im * b_re;
            }
            re.store(to_re + k);
            im.store(to_im + k);
        }
        most_.push_back(rows_.strongest(i, grid_.places));
        largest_ = std::max(largest_, most_[i] * most_[i]);
    }

    struct Part {
        const float *re, *im;
        float by_re, by_im;
    };
    const Grid& grid_;
    const std::vector<Cx>& G_;
    double share_, largest_ = 0.0;
    int size_ = 0;
    Rows rows_, t_;
    std::vector<double> most_;
    std::vector<Part> parts_;
};

/// sum += a * b, complex.
void add_product(const float* a_re, const float* a_im, const float* b_re, const float* b_im, float* sum_re,
                 float* sum_im, int width) {
    for (int i = 0; i < width; i += lanes) {
        const Eight ar = load(a_re + i), ai = load(a_im + i), br = load(b_re + i), bi = load(b_im + i);
        (load(sum_re + i) + (ar * br - ai * bi)).store(sum_re + i);
        (load(sum_im + i) + (ar * bi + ai * br)).store(sum_im + i);
    }
}

}  // namespace

Grid::Grid(const Track& track, double spacing_, int ahead_) : spacing(spacing_), ahead(ahead_) {
    start = track.first - (taps / 2) * spacing;
    const int midpoints = static_cast<int>(std::ceil(track.step * (track.traces - 1) / spacing)) + taps + 2;
    half = in_lanes((midpoints + 1) / 2);
    places = in_lanes(half + std::max(3, ahead / 2 + 2) + taps);
    middle = static_cast<int>(std::ceil((track.farthest + 0.5 * track.separation) / (2.0 * spacing))) + taps + 3;
    traces.reserve(static_cast<std::size_t>(track.traces));
    for (int i = 0; i < track.traces; ++i) {
        const Between at((track.first + i * track.step - start) / spacing);
        // Every second midpoint is in the same half: weights of the first one's half come first.
        Trace trace{at.skip + 1 - taps / 2, {}};
        for (int t = 0; t < taps; ++t) trace.weight[(t & 1) * taps / 2 + t / 2] = at.weight[t];
        traces.push_back(trace);
    }
    const double dk = 2.0 * pi / track.period, widest = pi / (2.0 * oversampling * spacing);
    wave = waves(2.0 * spacing, middle + 1, dk, static_cast<int>(widest / dk) + 2);
}

double Grid::first_place(const Track& track) const {
    return start - 0.5 * track.separation - (taps / 2 - 1) * 2.0 * spacing;
}

const Grid& Grids::for_waves(double widest) {
    const double coarsest = pi / (2.0 * widest * oversampling);
    int ahead = static_cast<int>(std::ceil(track_.separation / coarsest)), step = 0;
    double spacing = track_.separation / std::max(ahead, 1);
    if (ahead < enough_ahead) {
        ahead = track_.separation > 0.0 ? -1 : 0;
        step = static_cast<int>(std::ceil(-octave_steps * std::log2(coarsest)));
        spacing = std::exp2(-step / octave_steps);
    }
    return grids_.try_emplace({ahead, step}, track_, spacing, ahead).first->second;
}

Table::Table(const Level& level, int order, const Grid& grid, const Host& host, const Spectra& spectra, int count,
             double loudness)
    : width(2 * grid.middle + 1 + lanes) {
    const int columns = (2 * order + 2 + 3) / 4 * 4;
    std::vector<float> sums(static_cast<std::size_t>(count) * columns), differences(sums.size());
    const Cx inverse_k = Cx{1.0} / spectra.k;
    for (int k = 0; k < count; ++k) {
        const std::size_t at = static_cast<std::size_t>(k);
        const double kx = k * spectra.spacing;
        const Cx kz = spectra.kz[at], sent = (spectra.spacing / loudness * (k == 0 ? 0.5 : 1.0)) * spectra.down[at];
        const Cx down = sent * level.to_top[at];
        const Cx up = host.endless() ? Cx{} : sent * spectra.below[at] * spectra.pass[at] * level.to_bottom[at];
        const Cx E = (Cx{kx} + turn(kz)) * inverse_k, E_inverse = (Cx{kx} - turn(kz)) * inverse_k;
        Cx P{1.0}, Q{1.0};
        double sign = 1.0;
        for (int n = 0; n <= order; ++n, P = P * E, Q = Q * E_inverse, sign = -sign) {
            const Cx alpha = down * Q + up * P, beta = sign * (down * P + up * Q), sum = alpha + beta,
                     difference = beta - alpha;  // j S: j j = -1
            const std::size_t to = at * columns + 2 * static_cast<std::size_t>(n);
            sums[to] = static_cast<float>(sum.re);
            sums[to + 1] = static_cast<float>(sum.im);
            differences[to] = static_cast<float>(difference.re);
            differences[to + 1] = static_cast<float>(difference.im);
        }
    }
    // Lanes past the last place read on into the next row; nobody looks at what they make of it.
    cosines.resize(static_cast<std::size_t>(columns) * width + 4 * lanes);
    sines.resize(cosines.size());
    sum_waves(grid.wave, false, sums, count, columns, grid.middle, width, cosines);
    sum_waves(grid.wave, true, differences, count, columns, grid.middle, width, sines);
}

void add_echo(const Grid& grid, const Track& track, const std::vector<Scatterer>& targets,
              const std::vector<const Table*>& tables, const std::vector<Cx>& G, double share, Cx factor, Complex* out,
              std::size_t stride) {
    const Illumination lit(grid, track, targets, tables, G, share);
    const int filled = grid.places - taps;  // places of either kind that can be filled in between
    static const Grid::Weights midway = weights(0.5);
    const double on = 0.5 * track.separation / grid.spacing;
    const Between far_even(on), far_odd(on + 0.5);
    Rows odd(1, grid.places), far(2, grid.places), sum(2, grid.half);
    for (int row = 0; row < lit.size(); ++row) {
        if (!lit.matters(row)) continue;
        const float* const re = lit.rows().re.data() + lit.rows().at(row);
        const float* const im = lit.rows().im.data() + lit.rows().at(row);
        interpolate(midway, re, odd.re.data(), filled);
        interpolate(midway, im, odd.im.data(), filled);
        const float* const near_re[2] = {re + taps / 2 - 1, odd.re.data()};
        const float* const near_im[2] = {im + taps / 2 - 1, odd.im.data()};
        for (int p = 0; p < 2; ++p) {
            const float *far_re, *far_im;
            if (grid.ahead >= 0) {
                const int place = p + grid.ahead;
                far_re = near_re[place & 1] + place / 2;
                far_im = near_im[place & 1] + place / 2;
            } else {
                const Between& at = p == 0 ? far_even : far_odd;
                interpolate(at.weight, re + at.skip, far.re.data() + far.at(p), grid.half);
                interpolate(at.weight, im + at.skip, far.im.data() + far.at(p), grid.half);
                far_re = far.re.data() + far.at(p);
                far_im = far.im.data() + far.at(p);
            }
            add_product(near_re[p], near_im[p], far_re, far_im, sum.re.data() + sum.at(p), sum.im.data() + sum.at(p),
                        grid.half);
        }
    }
    for (std::size_t i = 0; i < grid.traces.size(); ++i) {
        const Grid::Trace& trace = grid.traces[i];
        const std::size_t first = sum.at(trace.left & 1) + static_cast<std::size_t>(trace.left / 2),
                          second = sum.at((trace.left + 1) & 1) + static_cast<std::size_t>((trace.left + 1) / 2);
        const Eight a = load(trace.weight.data()), b = load(trace.weight.data() + lanes);
        const float re = (a * load(sum.re.data() + first) + b * load(sum.re.data() + second)).sum(),
                    im = (a * load(sum.im.data() + first) + b * load(sum.im.data() + second)).sum();
        out[i * stride] += Complex(factor * Cx{static_cast<double>(re), static_cast<double>(im)});
    }
}

}  // namespace gg
