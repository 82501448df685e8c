#include "paper/pair_desk.hpp"

#include <cmath>

namespace gg {
namespace {

// Of section_effort(): 0.02 ms each on one core of a desktop, 0.1 ms on a phone. Past the first there is no section,
// past the second no search for the least gap, which takes two to four sections, past the third none in other grounds,
// which takes thirty: ten seconds of a phone at most.
constexpr double most_effort = 50000.0, most_search_effort = 20000.0, most_range_effort = 5000.0;

}  // namespace

void PairDesk::begin(const PairOrder& order, Detail detail) {
    pair_ = {};
    pair_.detail = detail;
    const Plan plan = as_pair(order.plan);
    std::string fault = section_fault(plan);
    if (fault.empty()) {
        effort_ = section_effort(scene_for(plan));
        if (effort_ > most_effort)
            fault = "The section of this plan takes too long for a screen; the command line computes it.";
    }
    if (fault.empty()) {
        pair_ = pair_section(plan, detail, order.field);
    } else {
        pair_.section.issue = Issue::out_of_range;
        pair_.section.reason = std::move(fault);
    }
}

void PairDesk::bring_to(const PairOrder& order) {
    const bool same = last_ && last_->plan == order.plan && last_->field == order.field;
    if (order.step <= PairStep::searched) {
        begin(order, Detail::coarse);
    } else if (order.step == PairStep::full || !same || pair_.detail != Detail::full) {
        begin(order, Detail::full);
    }
    if (!pair_.section.ok()) return;
    if (order.step <= PairStep::searched) glance(order);
    if (order.step == PairStep::focused) add_focused(pair_);
    if (order.step >= PairStep::raw && effort_ <= most_search_effort) measure(order);
}

PairDesk::Searched PairDesk::searched_in(const PairOrder& order, const Scene& scene) {
    Searched out{order.plan, order.field, scene.sampling.step};
    out.plan.target.gap = Target{}.gap;
    return out;
}

/// Beside a coarse section, which has only some of the traces to read: the dip, and what is known of the least gaps.
void PairDesk::glance(const PairOrder& order) {
    const Scene scene = scene_for(as_pair(order.plan), Detail::full, order.field);
    Separation& s = pair_.separation.emplace();
    if (searched_ == searched_in(order, scene)) {
        s = found_;
        s.focused = {};  // from the least gap on there are two
        const double gap = std::abs(scene.targets[0].x - scene.targets[1].x);
        if (s.least_focused.ok() && gap >= s.least_focused.value) s.focused.depth = s.focused.needed;
    } else if (order.step == PairStep::searched && effort_ <= most_search_effort) {
        s.least_raw = smallest_gap(scene, Reading::raw);
        s.known = Separation::Known::raw;
    } else {
        s.known = Separation::Known::dip;
    }
    s.raw = raw_dip(scene);
}

void PairDesk::measure(const PairOrder& order) {
    const Searched here = searched_in(order, pair_.scene);
    if (!pair_.separation && searched_ == here) {
        pair_.separation = found_;
        pair_.separation->raw = dip_sideways(pair_.scene, pair_.section, Reading::raw);
        pair_.separation->focused = dip_sideways(pair_.scene, pair_.section, Reading::focused);
    }
    if (!pair_.separation) {
        read_separation(pair_.scene, pair_.section, Reading::raw, pair_.separation.emplace());
        pair_.separation->known = Separation::Known::raw;
    }
    Separation& s = *pair_.separation;
    if (order.step == PairStep::raw) return;
    if (s.known == Separation::Known::raw) {
        read_separation(pair_.scene, pair_.section, Reading::focused, s);
        s.known = Separation::Known::likely;
    }
    if (order.step == PairStep::all && s.known == Separation::Known::likely && effort_ <= most_range_effort)
        add_ranges(s, order.plan, order.field);
    searched_ = here;
    found_ = s;
}

std::string PairDesk::answer(std::string_view bytes) {
    const std::optional<PairOrder> order = read_order(bytes);
    if (!order) return {};
    bring_to(*order);
    last_ = order;
    return write_answer(order->number, order->step, pair_);
}

}  // namespace gg
