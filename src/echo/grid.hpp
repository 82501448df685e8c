#pragma once
/// Antenna positions on an even grid of their own, as coarse as one frequency's echo allows, and from there onto the
/// traces.
#include <vector>

#include "echo/coupling.hpp"

namespace gg {

/// The grid of one frequency: as coarse as that frequency's echo allows.
struct Grid {
    double start = 0.0, spacing = 0.0;  ///< m; antenna midpoints at start + i * spacing
    int half = 0;                       ///< points in each half: those of even and those of odd i
};

/// What the line needs of the grid.
struct Track {
    double first = 0.0, step = 0.0;  ///< m
    int traces = 0;
    double separation = 0.0;  ///< m
    double period = 0.0;      ///< m all the way round
};

/// @param widest  1/m, the largest horizontal wave number that reaches a target; an echo's is twice that
Grid grid_for(const Track& line, double widest);

/// Echo of all targets on the grid, up to the constant of reciprocity: sum (-1)^n g_{q,-n} (T a)_{qn},
/// with a and g the incident coefficients of a source at the transmitter and one at the receiver.
/// The coefficients have half the echo's bandwidth and depend on the distance from the target alone: they are summed
/// over kx once per depth, at distances 2 * spacing apart on one side, and interpolated to where they are needed.
std::vector<Complex> echo_on(const Grid& grid, const Track& line, const std::vector<Scatterer>& targets,
                             const Host& host, const Spectra& spectra, int count, const std::vector<Complex>& joint,
                             double share);

/// Adds `factor` times the values on the grid, interpolated, to one number per trace, `stride` apart.
/// Windowed sinc of 16 points over a 1.35-fold oversampled echo: 2e-4 of what stands at the band's edge, less inside.
void onto_traces(const Grid& grid, const Track& line, const std::vector<Complex>& values, Complex factor, Complex* out,
                 std::size_t stride);

}  // namespace gg
