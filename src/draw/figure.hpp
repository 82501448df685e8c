#pragma once
/// The pictures: each draws a Plan's Answers on a Canvas and tells what of it can be dragged.
#include <string>
#include <vector>

#include "draw/canvas.hpp"
#include "draw/palette.hpp"
#include "draw/units.hpp"
#include "survey/answers.hpp"
#include "survey/section.hpp"

namespace gg {

/// How the section is looked at; no part of the plan.
struct SectionLook {
    Gain gain = Gain::even;
    bool layers = false;   ///< with the echoes of the layers' boundaries; without, as after background removal
    bool focused = false;  ///< where only one fits: the focused picture instead of the raw one
    bool operator==(const SectionLook&) const = default;
};

struct FigureStyle {
    Box box;  ///< where to draw, css px
    bool dark = false;
    UnitSystem units = UnitSystem::metric;
    double text = 14.0;   ///< css px of normal text in the picture; small text is 0.85 of it
    bool handles = true;  ///< draw the drag handles (off in print)
    std::string held;     ///< key of the handle being dragged now, drawn strong; empty: none
    /// For Pair: the newest section there is, perhaps of an earlier state of the plan; null: travel times are drawn.
    const PairSection* section = nullptr;
    bool computing = false;  ///< a newer one is on its way, and that should be said
    SectionLook look{};
};

/// Something on the picture that drags one number of the plan.
struct Handle {
    enum class Way : std::uint8_t { across, down, round };
    std::string field;  ///< key for set_number
    std::string name;   ///< "Depth to top", for screen readers and the hint
    Point at;           ///< centre of the grip, css px
    Way way = Way::down;
    /// across / down: value = start + per_px * (pixels moved). round: value = angle of (pointer - pivot) clockwise from
    /// up.
    double start = 0.0, per_px = 0.0;
    Point pivot;
    double snap = 0.0;  ///< rounds dragged values to this, SI; 0: not
    /// across / down: 1/value moves evenly instead (a frequency dragged by its wavelength); per_px is then the rate at
    /// the start.
    bool inverse = false;
    double turn = 0.0;  ///< round: rad after which values repeat; 0: a whole turn
};

/// Value of a handle's field after the pointer went from `from` to `to`, css px; snapped, not yet held to the field's
/// limits.
double dragged(const Handle& handle, Point from, Point to);

struct Figure {
    std::vector<Handle> handles;
    std::string
        description;  ///< one or two sentences: what the picture shows, with its numbers; SVG <desc> and screen readers
};

Figure beam_figure(Canvas& canvas, const Plan& plan, const Answers& answers, const FigureStyle& style);
Figure pulse_figure(Canvas& canvas, const Plan& plan, const Answers& answers, const FigureStyle& style);
Figure pair_figure(Canvas& canvas, const Plan& plan, const Answers& answers, const FigureStyle& style);
Figure lanes_figure(Canvas& canvas, const Plan& plan, const Answers& answers, const FigureStyle& style);

/// The views, in order; the only list of them.
enum class View : std::uint8_t { beam, pulse, pair, lanes };
struct ViewRow {
    View view;
    const char* id;    ///< "beam"
    const char* name;  ///< "Beam"
    const char* says;  ///< "The cut through the ground, to true scale"
    Figure (*draw)(Canvas&, const Plan&, const Answers&, const FigureStyle&);
    std::vector<std::string> fields;   ///< keys of the inputs this view depends on most, first four for a phone
    std::vector<std::string> answers;  ///< keys of the answers that matter here
};
const std::vector<ViewRow>& views();

}  // namespace gg
