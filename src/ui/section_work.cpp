#include "ui/section_work.hpp"

#include <algorithm>
#include <limits>
#include <utility>

namespace gg {
namespace {

constexpr double rest = 0.5;           // s without a change before a search begins
constexpr double say_after = 0.15;     // s that an order is out before the picture says so: shorter ones would flicker
constexpr double give_up_after = 1.0;  // s that an order of a plan gone by may go on
constexpr double while_dragging =
    0.06;  // s for a whole round trip with a search in it, so that it keeps up with a hand

/// The plan with all that the section does not depend on as in a new one.
Plan needed(const Plan& plan) {
    Plan out;
    const double length = out.target.length, bearing = out.target.bearing, trace_rate = out.pass.trace_rate;
    out.ground = plan.ground;
    out.target = plan.target;
    out.target.length = length;
    out.target.bearing = bearing;
    out.antenna = plan.antenna;
    out.pass = plan.pass;
    out.pass.trace_rate = trace_rate;
    return out;
}

}  // namespace

std::optional<std::string> SectionWork::step(const Plan& plan, Polarisation field, bool held, double now) {
    held_ = held;
    if (Of of{needed(plan), field}; !(wanted_ == of)) {
        if (plan.name != name_) {
            pair_.reset(), of_.reset(), asked_.reset();
            reason_.clear();
        }
        wanted_ = std::move(of);
        since_ = now;
    }
    name_ = plan.name;
    if (inbox_) open_inbox(now);
    if (asked_ && !(outrun() && now - asked_->at >= give_up_after)) return {};
    const std::optional<PairStep> next = next_step(now);
    if (!next) return {};
    asked_ = {++number_, *next, *wanted_, now};
    return write_order({asked_->number, *next, wanted_->field, wanted_->plan});
}

/// Something else is wanted by now. Not so while a hand moves: then every coarse section is of a plan gone by.
bool SectionWork::outrun() const { return !(asked_->of == *wanted_) && !(held_ && asked_->step <= PairStep::searched); }

std::optional<PairStep> SectionWork::next_step(double now) const {
    if (!current()) {
        if (!held_) return PairStep::full;
        return coarse_trip_ + search_trip_ < while_dragging ? PairStep::searched : PairStep::coarse;
    }
    if (held_ || !section()) return {};
    switch (done_) {
        case PairStep::coarse:
        case PairStep::searched:
            return PairStep::full;
        case PairStep::full:
            return PairStep::focused;
        case PairStep::focused:
            if (now - since_ < rest) return {};
            return PairStep::raw;
        case PairStep::raw:
            return PairStep::likely;
        case PairStep::likely:
            return PairStep::all;
        case PairStep::all:
            break;
    }
    return {};
}

void SectionWork::open_inbox(double now) {
    std::optional<PairAnswer> answer = read_answer(*std::exchange(inbox_, {}));
    if (!asked_ || (answer && answer->number != asked_->number)) return;
    const double trip = now - asked_->at;
    if (asked_->step == PairStep::coarse) coarse_trip_ = trip;
    if (asked_->step == PairStep::searched) search_trip_ = std::max(0.0, trip - coarse_trip_);
    if (asked_->step == PairStep::raw) search_trip_ = trip;
    done_ = asked_->step;
    if (!answer || answer->step != done_ || !keep(*answer)) {
        pair_.reset();
        reason_ = "The section of this plan could not be computed on this device.";
    }
    of_ = std::move(asked_->of);
    asked_.reset();
}

/// False where it does not fit what was asked for.
bool SectionWork::keep(PairAnswer& answer) {
    PairSection& got = answer.pair;
    const bool same = of_ == asked_->of && pair_;
    if (answer.step <= PairStep::full) {
        reason_ = got.section.reason;
        got.scene = scene_for(as_pair(asked_->of.plan), got.detail, asked_->of.field);
        const Sampling& s = got.scene.sampling;
        if (got.section.ok() && (got.section.traces != s.traces || got.section.samples != s.samples)) return false;
        if (same && !got.separation) got.separation = pair_->separation;
        if (got.section.ok() && section() && section()->focused.rows > 1) {
            // Until there is a new one, so that the layout stands still in a hand that drags.
            got.focused = std::move(pair_->focused);
            got.focused_gain = std::move(pair_->focused_gain);
            got.focused_before = !same || pair_->focused_before;
        }
        pair_ = std::move(got);
        return true;
    }
    if (!same) return false;
    if (answer.step == PairStep::focused) {
        pair_->focused = std::move(got.focused);
        pair_->focused_gain = std::move(got.focused_gain);
        pair_->focused_before = false;
    }
    if (got.separation) pair_->separation = got.separation;
    return true;
}

bool SectionWork::least_gaps_hold() const {
    if (!of_ || !wanted_) return false;
    Of at_this_gap = *of_;
    at_this_gap.plan.target.gap = wanted_->plan.target.gap;
    return at_this_gap == *wanted_;
}

bool SectionWork::computing(double now) const { return asked_ && now - asked_->at >= say_after; }

double SectionWork::due(double now) const {
    if (inbox_ || !wanted_) return 0.0;
    if (asked_ && !computing(now)) return std::max(0.0, asked_->at + say_after - now);
    if (asked_ && outrun()) return std::max(0.0, asked_->at + give_up_after - now);
    if (asked_) return std::numeric_limits<double>::infinity();
    if (next_step(now)) return 0.0;
    if (!held_ && section() && done_ == PairStep::focused) return std::max(0.0, since_ + rest - now);
    return std::numeric_limits<double>::infinity();
}

}  // namespace gg
