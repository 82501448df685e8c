#pragma once
/// Pair's section, brought up to the plan by somebody who computes beside the screen: decides what to order next, and
/// holds what has come back.
#include <optional>

#include "paper/pair_bytes.hpp"

namespace gg {

class SectionWork {
  public:
    /// Once a frame while Pair is open: takes in what has come, and gives the order that is to go out now, if any.
    /// While something is held, the coarse section of the newest change with what is told apart in it; at rest the full
    /// one, its focused picture, and once the plan has been still for a while the least gaps. One order is out at a
    /// time, and changes wait for its answer; one that takes long and is of a plan gone by is given up for the next.
    /// @param now  s
    std::optional<std::string> step(const Plan& plan, Polarisation field, bool held, double now);
    /// What came back for an order, for the next step(); empty: it could not be computed.
    void take(std::string_view answer) { inbox_ = std::string(answer); }

    /// The newest there is, if of an earlier state of the plan; null before the first and where there is none.
    const PairSection* section() const { return pair_ && pair_->section.ok() ? &*pair_ : nullptr; }
    /// The section, or the reason for none, is of the plan last given.
    bool current() const { return of_ == wanted_; }
    /// So are the least gaps that came with it: they do not depend on the plan's own gap.
    bool least_gaps_hold() const;
    /// Why there is none, one sentence.
    const std::string& reason() const { return reason_; }
    /// An order has been out for so long that it should be said.
    bool computing(double now) const;
    /// Seconds until step() has more to do if no answer comes before; infinity: nothing.
    double due(double now) const;

  private:
    /// What a section depends on.
    struct Of {
        Plan plan;
        Polarisation field = Polarisation::along;
        bool operator==(const Of&) const = default;
    };
    struct Asked {
        std::uint32_t number = 0;
        PairStep step = PairStep::full;
        Of of;
        double at = 0.0;
    };
    void open_inbox(double now);
    bool keep(PairAnswer& answer);
    std::optional<PairStep> next_step(double now) const;
    bool outrun() const;

    std::string name_;  // of the plan: a section of another plan altogether is not shown
    std::optional<Of> wanted_, of_;
    std::optional<PairSection> pair_;
    std::string reason_;
    PairStep done_ = PairStep::all;
    std::optional<Asked> asked_;
    std::optional<std::string> inbox_;
    std::uint32_t number_ = 0;
    bool held_ = false;
    double since_ = 0.0;                            // s, last change of wanted_
    double coarse_trip_ = 0.0, search_trip_ = 1.0;  // s that a coarse section, and a search in it, took lately
};

}  // namespace gg
