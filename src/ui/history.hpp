#pragma once
/// Undo by value: whole plans, kept when a plan has been still for a second or a gesture ends.
#include <cstddef>
#include <vector>

#include "survey/plan.hpp"

namespace gg {

class History {
  public:
    History();
    explicit History(Plan first);

    /// Looks at the plan as it is at time `now` (s). While `busy` (a drag or a held button) nothing is kept.
    void watch(const Plan& plan, double now, bool busy);
    /// Keeps the plan now if it differs from the last one kept: at the end of a gesture, before an act.
    void settle(const Plan& plan);
    bool can_undo(const Plan& plan) const { return at_ > 0 || !(plan == kept_[at_]); }
    bool can_redo() const { return at_ + 1 < kept_.size(); }
    Plan undo(const Plan& plan);  ///< the plan before; `plan` itself where there is none
    Plan redo(const Plan& plan);  ///< the plan undone last; `plan` itself where there is none
    /// Seconds from `now` until watch() would keep the plan; infinity where nothing waits.
    double due(const Plan& plan, double now) const;

  private:
    std::vector<Plan> kept_;  // never empty
    std::size_t at_ = 0;
    Plan seen_;
    double since_ = 0.0;
};

}  // namespace gg
