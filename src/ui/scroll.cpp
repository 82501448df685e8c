#include "ui/scroll.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace gg {

static constexpr double slop = 8.0;        // css px a finger may wander and still tap
static constexpr double hold = 0.3;        // s at rest until a press goes through
static constexpr double coast = 0.325;     // s, time constant of the coasting
static constexpr double slowest = 12.0;    // css px/s, below which coasting ends
static constexpr double page_turn = 0.07;  // s, time constant of coming to rest on a page

Scroll* Scrolls::under(Point p, bool across) {
    Scroll* best = nullptr;
    int top = 0;
    for (auto& [id, scroll] : all_)
        if (scroll.seen) top = std::max(top, scroll.layer);
    for (auto& [id, scroll] : all_) {
        if (!scroll.seen || scroll.layer != top || scroll.across != across || !(scroll.most > 0) ||
            !scroll.box.holds(p))
            continue;
        if (!best || scroll.box.width * scroll.box.height < best->box.width * best->box.height) best = &scroll;
    }
    return best;
}

bool Scrolls::settle(double seconds, bool held, bool reduced_motion) {
    bool moving = false;
    for (auto& [id, scroll] : all_) {
        if (!scroll.seen) continue;
        const double before = scroll.at;
        if (!held && scroll.speed != 0.0 && scroll.page <= 0) {
            if (reduced_motion) scroll.speed = 0.0;
            scroll.at += scroll.speed * seconds;
            scroll.speed *= std::exp(-seconds / coast);
            if (std::abs(scroll.speed) < slowest) scroll.speed = 0.0;
        }
        if (!held && scroll.page > 0) {
            const double lead = std::clamp(scroll.speed * 0.25, -0.5 * scroll.page, 0.5 * scroll.page);
            const double rest = std::min(scroll.most, std::round((scroll.at + lead) / scroll.page) * scroll.page);
            const double left = rest - scroll.at;
            scroll.at =
                reduced_motion || std::abs(left) < 0.5 ? rest : scroll.at + left * (1 - std::exp(-seconds / page_turn));
            if (scroll.at == rest) scroll.speed = 0.0;
            moving |= scroll.at != rest;
        }
        const double inside = std::clamp(scroll.at, 0.0, std::max(0.0, scroll.most));
        if (inside != scroll.at) scroll.speed = 0.0;
        scroll.at = inside;
        moving |= scroll.speed != 0.0 || scroll.at != before;
    }
    return moving;
}

void Scrolls::begin_frame() {
    for (auto& [id, scroll] : all_) scroll.seen = false;
}

void Finger::down(Point p, bool grip, PointerOut& out) {
    from_ = last_ = p;
    since_ = -1.0;
    moved_ = 0.0;
    let_go_ = false;
    scroll_ = nullptr;
    out.at(p);
    state_ = State::waiting;
    if (grip) {
        out.button(true);
        state_ = State::pressed;
    }
}

void Finger::move(Point p, Scrolls& scrolls, PointerOut& out) {
    if (state_ == State::pressed) out.at(p);
    if (state_ == State::waiting && std::hypot(p.x - from_.x, p.y - from_.y) > slop) {
        const bool across = std::abs(p.x - from_.x) > std::abs(p.y - from_.y);
        scroll_ = scrolls.under(from_, across);
        out.away();
        state_ = scroll_ ? State::scrolling : State::spent;
        if (scroll_) scroll_->speed = 0.0;
    }
    if (state_ == State::scrolling && scroll_) {
        const double by = scroll_->across ? last_.x - p.x : last_.y - p.y;
        scroll_->at = std::clamp(scroll_->at + by, 0.0, std::max(0.0, scroll_->most));
        moved_ += by;
    }
    last_ = p;
}

void Finger::up(Point p, PointerOut& out) {
    if (state_ == State::waiting) {
        out.at(p);
        out.button(true);
        out.button(false);
    } else if (state_ == State::pressed) {
        out.at(p);
        out.button(false);
    }
    let_go_ = state_ == State::scrolling;
    out.away();
    state_ = State::off;
}

void Finger::cancel(PointerOut& out) {
    // The position goes first: a release over nothing clicks nothing.
    out.away();
    if (state_ == State::pressed) out.button(false);
    if (state_ != State::off) state_ = State::spent;
    scroll_ = nullptr;
}

void Finger::tick(double now, PointerOut& out) {
    const double seconds = now - last_frame_;
    last_frame_ = now;
    if (scroll_ && (state_ == State::scrolling || let_go_) && seconds > 0) {
        // The speed that is let go is that of the last few frames, not of the last alone; a finger that rested leaves
        // none.
        if (seconds > 0.1)
            scroll_->speed = 0.0;
        else
            scroll_->speed = 0.5 * scroll_->speed + 0.5 * std::clamp(moved_ / seconds, -4000.0, 4000.0);
        moved_ = 0.0;
        let_go_ = false;
    }
    if (state_ != State::waiting) return;
    if (since_ < 0) since_ = now;
    if (now - since_ >= hold) {
        out.button(true);
        state_ = State::pressed;
    }
}

double Finger::due(double now) const {
    if (let_go_) return 0.0;
    if (state_ != State::waiting) return std::numeric_limits<double>::infinity();
    return since_ < 0 ? 0.0 : std::max(0.0, since_ + hold - now);
}

}  // namespace gg
