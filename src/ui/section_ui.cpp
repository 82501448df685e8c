// How Pair's section is looked at: a row of switches under the picture.
#include "ui/parts.hpp"

namespace gg {

void section_switches_ui(Screen& s, Box row) {
    Session& session = s.session;
    if (!session.section) {
        const std::string words = session.computing ? "Computing the section" : session.words(session.no_section);
        s.label(row, words, {s.small, s.colours.soft_ink});
        return;
    }
    SectionLook& look = session.view.look;
    Polarisation& field = session.view.field;
    const bool beside = row.width >= 580;  // raw and focused both have room: nothing to choose
    const int count = beside ? 3 : 4;
    const double width = row.width / count;
    double x = row.x;
    const auto next = [&](const char* id, std::string_view label, std::string_view now) {
        const Box box{x + 2, row.y + 2, width - 4, row.height - 4};
        x += width;
        const Hit hit = s.control(id, "button", label, now, box);
        s.backdrop(box, hit, Look::quiet);
        s.line({box.x + 4, box.y, box.width - 8, box.height}, now, {s.small, s.colours.wave, Across::centre});
        return hit.pressed;
    };
    constexpr const char* gains[] = {"As recorded", "Even gain", "Strong gain"};
    if (next("section.gain", "Gain", gains[static_cast<int>(look.gain)]))
        look.gain = static_cast<Gain>((static_cast<int>(look.gain) + 1) % 3);
    const bool along = field == Polarisation::along;
    if (next("section.field", "Electric field", along ? "Field along" : "Field across"))
        field = along ? Polarisation::across : Polarisation::along;
    if (next("section.layers", "Echoes of the layers", look.layers ? "With layers" : "No layers"))
        look.layers = !look.layers;
    if (!beside && next("section.focused", "Picture", look.focused ? "Focused" : "Raw")) look.focused = !look.focused;
}

}  // namespace gg
