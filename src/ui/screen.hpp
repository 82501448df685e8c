#pragma once
/// One frame's drawing: the canvas, the look, and the few controls everything is made of. All positions in css px.
#include <deque>
#include <memory>
#include <string>
#include <string_view>
#include <vector>

#include "draw/palette.hpp"
#include "ui/imgui_canvas.hpp"
#include "ui/layout.hpp"
#include "ui/marks.hpp"
#include "ui/scroll.hpp"
#include "ui/session.hpp"

namespace gg {

/// What a control saw in this frame.
struct Hit {
    bool pressed = false;  ///< tapped, or acted on by the mirror or a key
    bool hovered = false, held = false;
    bool focused = false;
};

enum class Look : std::uint8_t { bare, quiet, strong, chosen };

struct Line {
    double size = 0.0;          ///< css px; 0: normal text
    Colour colour{0, 0, 0, 0};  ///< alpha 0: ink
    Across across = Across::left;
    bool strong = false;
};

class Screen {
  public:
    Screen(Session& session, const Surface& surface, Scrolls& scrolls, bool dark);

    // ---- the frame ----
    /// Starts a layer over those before it; only the topmost takes input and is marked.
    void begin_layer(const char* name, bool topmost);
    void end_layer();
    Canvas& canvas() { return *canvas_; }

    // ---- look ----
    const Palette& colours;
    Areas areas;
    double text, small, large;  ///< css px

    // ---- text ----
    /// One line in a box, centred up and down; made a little smaller, then cut with an ellipsis, where it is too long.
    void line(Box box, std::string_view words, Line how = {});
    /// Words broken into lines of at most `width`; gives the y below the last.
    double paragraph(double x, double y, double width, std::string_view words, Line how = {});
    double height_of(double width, std::string_view words, double size) const;
    double width_of(std::string_view words, double size) const;
    /// At most two lines in a box, centred.
    void label(Box box, std::string_view words, Line how = {});

    // ---- controls ----
    Hit control(const std::string& id, const char* role, std::string_view name, std::string_view value, Box box,
                bool repeats = false);
    bool button(const std::string& id, std::string_view words, Box box, Look look, std::string_view name = {});
    /// A button that shows a drawn sign.
    enum class Sign : std::uint8_t { menu, close, back, plus, minus, erase, more, undo, redo };
    bool sign_button(const std::string& id, Sign sign, std::string_view name, Box box, Look look = Look::bare,
                     bool repeats = false);
    void sign(Sign sign, Point centre, double size, Colour colour);
    void backdrop(Box box, Hit hit, Look look, double radius = 8.0);
    void hairline(double x, double y, double width);

    // ---- scrolling ----
    /// Clips to `box` and gives the y (or x) at which content starts.
    double begin_scroll(const std::string& id, Box box, bool across = false, double page = 0.0);
    /// @param end  y (or x) where the content ended
    void end_scroll(double end);

    /// Area that is visible in the region under way.
    Box visible() const { return clips_.back(); }
    Session& session;
    const Surface& surface;
    std::vector<Mark> marks;
    std::deque<std::string> presses;  ///< ids to act on, one a frame
    bool topmost = true;
    int layer = 0;
    double ratio;

  private:
    std::vector<std::string> lines_of(std::string_view words, double width, double size) const;
    std::unique_ptr<ImGuiCanvas> canvas_;
    Scrolls& scrolls_;
    std::vector<Box> clips_;
    std::vector<std::string> regions_;
};

}  // namespace gg
