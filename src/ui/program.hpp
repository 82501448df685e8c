#pragma once
/// The whole interactive program as a library: each platform is a thin shell that feeds it input and draws what it
/// made. One Program owns one Dear ImGui context. No clock, files or threads in here: time and stored text come in as
/// arguments, wishes go out as Requests.
#include <memory>
#include <string>
#include <string_view>
#include <vector>

#include "survey/plan.hpp"

namespace gg {

/// What the program asks of its platform after a frame.
struct Request {
    enum class Kind : std::uint8_t {
        store,      ///< keep `text` under `name` on this device ("plan", "preferences")
        save_file,  ///< hand the person a file called `name` with contents `text`
        open_file,  ///< let the person pick a plan file; answer with Program::opened()
        edit_text,  ///< lay a text field over box (css px), holding `text`; answer with Program::typed(name, ...)
        copy,       ///< put `text` on the clipboard
        announce,   ///< `text` for a screen reader, politely
        reckon      ///< give `text` to a PairDesk (paper/pair_desk.hpp) where that holds up no frame, and its answer to
                    ///< Program::reckoned(); an order still under way or waiting then is no longer wanted
    };
    Kind kind = Kind::store;
    std::string name, text;
    double x = 0, y = 0, width = 0, height = 0;
};

/// How the surface is now. Everything in css pixels but `pixel_ratio`.
struct Surface {
    double width = 360, height = 640, pixel_ratio = 1;
    double inset_top = 0, inset_right = 0, inset_bottom = 0, inset_left = 0;  ///< safe areas
    bool system_dark = false;
    bool reduced_motion = false;
    bool touch = false;  ///< the last pointer was a finger: keypad instead of a text field, larger targets
};

class Program {
  public:
    /// `font`: TTF bytes, kept alive by the caller. Opens the first demo plan.
    explicit Program(std::string_view font);
    ~Program();
    Program(const Program&) = delete;
    Program& operator=(const Program&) = delete;

    void set_surface(const Surface& surface);

    // ---- input; positions in css px ----
    void pointer_move(double x, double y, bool touch);
    void pointer_leave();
    void pointer_button(double x, double y, bool down, bool touch);
    void wheel(double dx, double dy);
    /// `pinch`: scale change since the last call; two fingers are on the surface. Cancels any press under way.
    void pinch(double x, double y, double scale);
    void key(int imgui_key, bool down);
    void character(unsigned codepoint);
    void typed(std::string_view name, std::string_view text, bool keep);
    void opened(std::string_view file_name, std::string_view contents);
    /// The answer to an order, for the next frame; empty when it could not be computed.
    void reckoned(std::string_view answer);
    /// Stored text from an earlier visit ("plan", "preferences"); call before the first frame.
    void restore(std::string_view name, std::string_view text);

    /// Builds one frame at time `now` (s, any origin, never going back). Afterwards ImGui::GetDrawData() is ready.
    /// When `font_changed()` turns true the atlas was rebuilt: upload the texture again before drawing.
    void frame(double now);
    bool font_changed();
    /// Seconds until the next frame is due: 0 at once, infinity when nothing moves.
    double wake_after() const;

    std::vector<Request> take_requests();

    // ---- for tests, the page's mirror and screen readers ----
    const Plan& plan() const;
    std::string plan_json() const;
    std::string answers_json() const;  ///< JSON of paper/plan_file.hpp's write_answers
    /// Controls on screen: [{"id","role","name","value","x","y","width","height"}], css px, in tab order.
    /// Roles: button, tab, spinbutton, option, slider (drag handles), checkbox.
    std::string controls_json() const;
    /// Acts on a control by its id, as a tap would: what the mirror calls.
    void press(std::string_view control_id);

  private:
    struct State;
    std::unique_ptr<State> state_;
};

}  // namespace gg
