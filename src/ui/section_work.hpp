#pragma once
/// Pair's section, brought up to the plan a step a frame, so that the screen never stands still for long.
#include <optional>

#include "survey/section.hpp"

namespace gg {

class SectionWork {
  public:
    /// At most one step: while something is held the coarse section of every change; at rest the full one, then its
    /// focused picture, and once the plan has been still for a while what is told apart in them.
    /// @param now  s
    void step(const Plan& plan, Polarisation polarisation, bool held, double now);
    /// Of the plan last given; null before the first step and where there is none.
    const PairSection* section() const { return pair_ && pair_->section.ok() ? &*pair_ : nullptr; }
    /// Why there is none, one sentence.
    const std::string& reason() const { return reason_; }
    /// Seconds until step() has more to do; infinity: nothing.
    double due(double now) const;

  private:
    enum class Stage : std::uint8_t { none, coarse, full, focused, raw_read, done };
    void begin(const Plan& plan, Polarisation polarisation, Detail detail);
    std::optional<Plan> plan_;  // what the section depends on
    Polarisation polarisation_ = Polarisation::along;
    Stage stage_ = Stage::none;
    std::optional<PairSection> pair_;
    Separation found_;
    std::string reason_;
    double effort_ = 0.0, since_ = 0.0;
};

}  // namespace gg
