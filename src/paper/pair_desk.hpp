#pragma once
/// Computes Pair's section to order: what a worker beside the screen runs.
#include <optional>
#include <string>
#include <string_view>

#include "paper/pair_bytes.hpp"

namespace gg {

class PairDesk {
  public:
    /// The answer to an order, both as bytes (paper/pair_bytes.hpp); empty for bytes that are no order. Takes
    /// milliseconds to seconds. The last section is kept, so that a further step of the same plan adds to it; any step
    /// of another plan begins at the beginning. The least gaps do not depend on the plan's own gap: they are searched
    /// once for all of those, and once known come with a coarse section already. A plan past what a screen can wait for
    /// has no section, one past what it can search in has no separation.
    std::string answer(std::string_view order);

  private:
    /// What the least gaps depend on.
    struct Searched {
        Plan plan;
        Polarisation field = Polarisation::along;
        double step = 0.0;  ///< m between the section's traces
        bool operator==(const Searched&) const = default;
    };
    static Searched searched_in(const PairOrder& order, const Scene& scene);
    void begin(const PairOrder& order, Detail detail);
    void bring_to(const PairOrder& order);
    void glance(const PairOrder& order);
    void measure(const PairOrder& order);

    std::optional<PairOrder> last_;
    PairSection pair_;
    double effort_ = 0.0;
    std::optional<Searched> searched_;  ///< what found_ is of
    Separation found_;
};

}  // namespace gg
