#pragma once
/// Regions that scroll, by finger, wheel or key; and what a finger on the glass means: a press, a drag or a scroll.
#include <map>
#include <string>

#include "draw/canvas.hpp"

namespace gg {

struct Scroll {
    Box box;              ///< where it is on the screen, css px
    double at = 0.0;      ///< how far it is scrolled, css px
    double most = 0.0;    ///< how far it can be
    double speed = 0.0;   ///< css px/s, while it coasts
    double page = 0.0;    ///< > 0: it comes to rest on multiples of this
    bool across = false;  ///< sideways
    int layer = 0;        ///< sheets above others have higher ones
    bool seen = false;    ///< drawn in the last frame
};

class Scrolls {
  public:
    Scroll& operator[](const std::string& id) { return all_[id]; }
    const std::map<std::string, Scroll>& all() const { return all_; }
    /// The region that a movement at `p` scrolls: on the top layer, along the axis asked for; null where there is none.
    Scroll* under(Point p, bool across);
    /// Lets regions coast and come to rest; true while any still moves.
    bool settle(double seconds, bool held, bool reduced_motion);
    void begin_frame();  ///< forgets which regions are drawn

  private:
    std::map<std::string, Scroll> all_;
};

/// What a finger's touch turned into, to be passed on.
struct PointerOut {
    virtual ~PointerOut() = default;
    virtual void at(Point p) = 0;
    virtual void away() = 0;
    virtual void button(bool down) = 0;
};

/// A press is held back until it is known to be no scroll: at once on a grip, after a short rest, or on lifting.
class Finger {
  public:
    /// @param grip  something under it is dragged, not scrolled
    void down(Point p, bool grip, PointerOut& out);
    void move(Point p, Scrolls& scrolls, PointerOut& out);
    void up(Point p, PointerOut& out);
    /// Two fingers, or the system took it: the press goes away without having clicked.
    void cancel(PointerOut& out);
    /// Presses that waited long enough go through, and the speed of a scroll is taken. Call once a frame: time is known
    /// only here.
    void tick(double now, PointerOut& out);
    /// Seconds until tick() has something to do; infinity: nothing.
    double due(double now) const;
    bool on_glass() const { return state_ != State::off; }
    bool scrolling() const { return state_ == State::scrolling; }

  private:
    enum class State : std::uint8_t { off, waiting, pressed, scrolling, spent };
    State state_ = State::off;
    Point from_, last_;
    double since_ = -1.0;      // s, first frame that saw the finger; < 0: none yet
    double last_frame_ = 0.0;  // s
    double moved_ = 0.0;       // css px scrolled since the last frame
    bool let_go_ = false;      // the scroll's speed is still to be settled
    Scroll* scroll_ = nullptr;
};

}  // namespace gg
