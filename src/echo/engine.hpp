#pragma once
/// The targets' echoes, for one ground, line and set of targets, which may be moved along the line.
#include <cstdint>
#include <vector>

#include "echo/grid.hpp"
#include "echo/recording.hpp"

namespace gg {

class Engine {
  public:
    /// @param scene   has no fault (fault_of) and at least one target
    /// @param care    as in section_of()
    /// @param spread  m: how far from the scene's places targets will be moved; 0: they stay, and nothing is kept for
    ///                a second call, which otherwise takes a fraction of the first one's time
    Engine(const Scene& scene, double care, double spread = 0.0);

    /// Section::targets with the targets at `x` (m, one each, none farther from the scene's than the spread).
    std::vector<double> echoes(const std::vector<double>& x);
    /// The same with the targets where the scene has them.
    std::vector<double> echoes() { return echoes(x_); }

  private:
    /// Of one tone, all that does not depend on the targets' places.
    struct Prepared {
        Tone tone;
        Complex constant;                     ///< of reciprocity
        double share = 0.0;                   ///< part of the strongest that counts
        std::vector<std::vector<Complex>> s;  ///< of each kind of target
        std::vector<std::size_t> count;       ///< of each target, orders that may count
        Spectra spectra;
        Directions directions;
        int between = 0;        ///< points of kx that paths by the boundaries need
        double loudness = 1.0;  ///< that the tables were divided by
        const Grid* grid = nullptr;
        std::vector<Level> levels;  // these three in the order of levels_
        std::vector<Table> tables;
        std::vector<Paths> own;
    };
    Prepared prepare(const Tone& tone);
    void add(const Prepared& prepared, const std::vector<double>& x);
    /// Half the distance to the nearest image or neighbour of a target, m, when each neighbour may come nearer by
    /// `closer`.
    double nearest(std::size_t target, const std::vector<double>& x, double closer) const;

    Scene scene_;
    double care_, spread_;
    Host host_;
    Recording recording_;
    Grids grids_;
    std::vector<double> x_;       ///< m, the scene's places
    std::vector<double> levels_;  ///< m below the host's top, each once
    std::vector<RoundTarget> kinds_;
    std::vector<std::size_t> level_of_, kind_of_;  ///< for each target
    std::vector<Prepared> kept_;
};

}  // namespace gg
