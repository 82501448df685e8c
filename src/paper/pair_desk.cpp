#include "paper/pair_desk.hpp"

namespace gg {
namespace {

// Of section_effort(): 0.1 ms each on one core of a desktop, 0.5 ms on a phone. Past the first there is no section,
// past the second no search for the least gap, which takes two to ten sections, past the third none in other grounds.
constexpr double most_effort = 20000.0, most_search_effort = 6000.0, most_range_effort = 3000.0;

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
    if (!pair_.section.ok() || order.step == PairStep::full) return;

    if (order.step == PairStep::focused) return add_focused(pair_);
    if (order.step >= PairStep::raw) {
        if (effort_ > most_search_effort) return;
        if (!pair_.separation) {
            read_separation(pair_.scene, pair_.section, Reading::raw, pair_.separation.emplace());
            pair_.separation->known = Separation::Known::raw;
        }
        if (order.step == PairStep::raw) return;
        if (pair_.separation->known == Separation::Known::raw) {
            read_separation(pair_.scene, pair_.section, Reading::focused, *pair_.separation);
            pair_.separation->known = Separation::Known::likely;
        }
        if (order.step == PairStep::all && effort_ <= most_range_effort)
            add_ranges(*pair_.separation, order.plan, order.field);
        return;
    }
    // At the plan's own step, whose traces the coarse section has only some of.
    const Scene scene = scene_for(as_pair(order.plan), Detail::full, order.field);
    Separation& s = pair_.separation.emplace();
    s.known = Separation::Known::dip;
    s.raw = raw_dip(scene);
    if (order.step == PairStep::coarse || effort_ > most_search_effort) return;
    s.least_raw = smallest_gap(scene, Reading::raw);
    s.known = Separation::Known::raw;
}

std::string PairDesk::answer(std::string_view bytes) {
    const std::optional<PairOrder> order = read_order(bytes);
    if (!order) return {};
    bring_to(*order);
    last_ = order;
    return write_answer(order->number, order->step, pair_);
}

}  // namespace gg
