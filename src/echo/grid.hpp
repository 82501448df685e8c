#pragma once
/// Antenna positions on an even grid of their own, as coarse as a frequency's echo allows, and from there onto the
/// traces.
#include <array>
#include <map>
#include <utility>

#include "echo/coupling.hpp"
#include "echo/lanes.hpp"

namespace gg {

/// What the line needs of its grids.
struct Track {
    double first = 0.0, step = 0.0;  ///< m
    int traces = 0;
    double separation = 0.0;  ///< m
    double period = 0.0;      ///< m all the way round: kx comes in steps of 2 pi / period
    double farthest = 0.0;    ///< m, between any antenna midpoint and any target
};

/// One spacing of antennas. Midpoints stand at start + i * spacing; what reaches a target has half the echo's
/// bandwidth, so that it is known on every second place and filled in between.
struct Grid {
    static constexpr int taps = 16;
    using Weights = std::array<float, taps>;
    struct Trace {
        int left;  ///< midpoint of the first weight
        Weights weight;
    };

    double start = 0.0, spacing = 0.0;  ///< m
    int half = 0;                       ///< midpoints with even i, and as many with odd i
    int ahead = 0;                      ///< the receiver is this many places on; -1: it stands between places
    int places = 0;                     ///< every second antenna place, and those the filling in needs at either side
    int middle = 0;                     ///< of a table of distances 2 * spacing apart, -middle .. middle
    std::vector<Trace> traces;
    Rows wave;  ///< cos and sin of kx d, d = i * 2 spacing, i = 0 .. middle; a row per kx

    Grid(const Track& track, double spacing, int ahead);
    double first_place(const Track& track) const;  ///< m
};

/// The grids of a line, made when first asked for. Few: spacings are the antennas' separation over a whole number
/// (receivers then stand where transmitters stood), or where that is too fine, steps of a twelfth of an octave.
class Grids {
  public:
    explicit Grids(const Track& track) : track_(track) {}
    /// @param widest  1/m, the largest horizontal wave number that reaches a target; an echo's is twice that
    const Grid& for_waves(double widest);
    const Track& track() const { return track_; }

  private:
    Track track_;
    std::map<std::pair<int, int>, Grid> grids_;
};

/// Standing waves about one depth from a source at distances 2 * spacing apart. With alpha and beta the spectra of
/// order n at +kx and, but for (-1)^n, at -kx, and d the distance to the right:
///   a_n, a_-n = (-j)^n (C_n +- S_n),  C = sum (alpha + (-1)^n beta) cos kx d,  S = j sum (alpha - (-1)^n beta) sin kx
///   d.
struct Table {
    int width = 0;
    std::vector<float> cosines, sines;  ///< re and im of C_0, C_1 .. and of j S_0, j S_1 .., a row of `width` each

    Table(const Level& level, int order, const Grid& grid, const Host& host, const Spectra& spectra, int count,
          double loudness);
};

/// Adds to each trace, `stride` apart, `factor` times the echo of all targets: sum_i v_i u_i, with u = G^-1 (rows of a
/// source at the transmitter) and v the same at the receiver. Rows that do not matter for `share` of it are left out.
/// @param tables  for each target that of its level   @param loudness  that the tables were divided by
void add_echo(const Grid& grid, const Track& track, const std::vector<Scatterer>& targets,
              const std::vector<const Table*>& tables, const std::vector<Cx>& G, double share, Cx factor, Complex* out,
              std::size_t stride);

}  // namespace gg
