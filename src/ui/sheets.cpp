// The head of the screen, and the frame of what is laid over it.
#include <imgui.h>

#include <algorithm>
#include <cmath>

#include "ui/parts.hpp"

namespace gg {

void header_ui(Screen& s) {
    const Box area = s.areas.header;
    if (!(area.width > 20 && area.height > 8)) return;
    Session& session = s.session;
    const double button = std::min(area.height, 48.0 * std::max(1.0, s.text / 20));
    const bool wide = s.areas.kind == Areas::Kind::desktop || s.areas.kind == Areas::Kind::tablet;
    s.canvas().box(area, s.colours.paper, 0);
    double left = area.x + s.areas.margin, right = area.right() - 4;
    const auto take = [&](double width) {
        right -= width;
        return Box{right, area.y + (area.height - button) / 2, width, button};
    };
    if (s.sign_button("menu", Screen::Sign::menu, "Menu", take(button))) session.show(Sheet::Kind::menu);
    if (wide && s.sign_button("redo", Screen::Sign::redo, "Redo", take(button))) session.redo();
    if (s.sign_button("undo", Screen::Sign::undo, "Undo", take(button))) session.undo();
    if (wide) {
        // The mark: three arcs going down from a point, as the wave does.
        for (int i = 1; i <= 3; ++i) {
            std::vector<Point> arc;
            for (int k = 0; k <= 16; ++k) {
                const double a = (0.18 + 0.64 * k / 16.0) * 3.14159265358979, r = 6.0 * i + 2;
                arc.push_back({left + 16 + r * std::cos(a), area.y + area.height / 2 - 11 + r * std::sin(a)});
            }
            s.canvas().line(arc, {s.colours.wave, 2.5}, false);
        }
        const double name = s.width_of("Groundgrain", s.text) + 6;
        s.line({left + 40, area.y, name, area.height}, "Groundgrain", {s.text, s.colours.wave, Across::left, true});
        left += 40 + name + 16;
        s.canvas().box({left - 8, area.y + 16, 1, area.height - 32}, s.colours.hairline, 0);
        left += 8;
    }
    const double size = wide ? s.large : s.text;
    const double name = std::min(right - left - 4, s.width_of(session.plan.name, size) + 12);
    const Box box{left, area.y + 4, std::max(0.0, name), area.height - 8};
    const Hit hit = s.control("plan.name", "button", "Rename " + session.plan.name, {}, box);
    s.backdrop({box.x - 6, box.y, box.width + 6, box.height}, hit, Look::bare);
    s.line(box, session.plan.name, {size, s.colours.ink, Across::left, true});
    if (hit.pressed) session.show(Sheet::Kind::rename);
    s.hairline(area.x, area.bottom() - 1, area.width);
}

Box sheet_frame(Screen& s, std::string_view title, double wanted, bool narrow) {
    const Box whole = s.areas.whole;
    const bool phone = s.areas.kind == Areas::Kind::phone || s.areas.kind == Areas::Kind::phone_side;
    const double margin = phone ? 16 : 20, head = s.areas.row;
    const double width =
        phone && whole.width < 560 ? whole.width : std::min(whole.width, (narrow ? 400.0 : 520.0) * s.text / 16);
    const double most = phone ? whole.height - std::min(24.0, whole.height * 0.1) : whole.height - 64;
    const double height = std::max(0.0, std::min(wanted + head, most));
    const Box box{whole.x + (whole.width - width) / 2,
                  phone ? whole.bottom() - height : whole.y + (whole.height - height) * 0.42, width, height};
    s.canvas().box({0, 0, s.surface.width, s.surface.height},
                   Colour{0, 0, 0, 255}.with_alpha(s.colours.dark ? 0.6 : 0.4), 0);
    // Below a phone's sheet its paper goes on to the edge, through the safe area.
    s.canvas().box({box.x, box.y, box.width, phone ? s.surface.height - box.y + 16 : box.height}, s.colours.paper, 14);
    s.line({box.x + margin, box.y, box.width - margin - head - 8, head}, title,
           {s.text, s.colours.ink, Across::left, true});
    const bool inner = s.session.view.sheets.size() > 1;
    if (s.sign_button("close", Screen::Sign::close, inner ? "Back" : "Close", {box.right() - head, box.y, head, head}))
        s.session.close();
    s.hairline(box.x, box.y + head - 1, box.width);
    const ImVec2 mouse = ImGui::GetIO().MousePos;
    if (s.topmost && ImGui::IsMouseClicked(ImGuiMouseButton_Left) && !box.holds({mouse.x / s.ratio, mouse.y / s.ratio}))
        s.session.close();
    return {box.x + margin, box.y + head, std::max(0.0, box.width - 2 * margin), std::max(0.0, box.height - head)};
}

static const char* title_of(const std::string& group) {
    if (group == "ground") return "Ground";
    if (group == "target") return "Target";
    return "All inputs";
}

void sheet_ui(Screen& s, const Sheet& sheet) {
    switch (sheet.kind) {
        case Sheet::Kind::card:
            return card_ui(s, sheet.key);
        case Sheet::Kind::keypad:
            return keypad_ui(s);
        case Sheet::Kind::list:
            return list_ui(s, sheet.key);
        case Sheet::Kind::menu:
            return menu_ui(s);
        case Sheet::Kind::demos:
            return demos_ui(s);
        case Sheet::Kind::rename:
            return rename_ui(s);
        case Sheet::Kind::about:
            return about_ui(s);
        case Sheet::Kind::inputs: {
            const Box box = sheet_frame(s, title_of(sheet.key), 1e4);
            const double y = s.begin_scroll("sheet.inputs", {box.x - 8, box.y, box.width + 16, box.height});
            s.end_scroll(all_inputs_ui(s, sheet.key, box.x, y + 4, box.width) + 16);
            return;
        }
    }
}

}  // namespace gg
