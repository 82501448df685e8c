#include "ui/history.hpp"

#include <algorithm>
#include <limits>
#include <utility>

namespace gg {

static constexpr double still = 1.0;         // s
static constexpr std::size_t longest = 200;  // plans; one is a few kilobytes

History::History() : kept_(1), seen_(kept_.front()) {}
History::History(Plan first) : kept_(1, std::move(first)), seen_(kept_.front()) {}

void History::watch(const Plan& plan, double now, bool busy) {
    if (!(plan == seen_) || busy) {
        seen_ = plan;
        since_ = now;
    } else if (now - since_ >= still) {
        settle(plan);
    }
}

void History::settle(const Plan& plan) {
    seen_ = plan;
    if (plan == kept_[at_]) return;
    kept_.resize(at_ + 1);
    kept_.push_back(plan);
    if (kept_.size() > longest) kept_.erase(kept_.begin());
    at_ = kept_.size() - 1;
}

Plan History::undo(const Plan& plan) {
    settle(plan);
    if (at_ > 0) --at_;
    return seen_ = kept_[at_];
}

Plan History::redo(const Plan& plan) {
    settle(plan);
    if (can_redo()) ++at_;
    return seen_ = kept_[at_];
}

double History::due(const Plan& plan, double now) const {
    if (plan == kept_[at_]) return std::numeric_limits<double>::infinity();
    return std::max(0.0, since_ + still - now);
}

}  // namespace gg
