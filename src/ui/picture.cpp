// The picture, and dragging on it.
#include <imgui.h>

#include <algorithm>
#include <cmath>

#include "ui/parts.hpp"

namespace gg {

static constexpr double finger_reach = 30.0, mouse_reach = 22.0;  // css px around a grip's centre
static constexpr double hint_fades = 0.6;                         // s

const Handle* handle_near(const Figure& figure, Point p, bool touch) {
    const Handle* best = nullptr;
    double least = touch ? finger_reach : mouse_reach;
    for (const Handle& handle : figure.handles) {
        const double away = std::hypot(handle.at.x - p.x, handle.at.y - p.y);
        if (away <= least) least = away, best = &handle;
    }
    return best;
}

/// Pulls the held number to where the pointer is, inside its limits.
static void drag(Session& session, const Grip& grip, Point pointer) {
    const auto field = find_field(session.plan, grip.field);
    if (!field) return;
    session.set(grip.field, std::clamp(dragged(grip.handle, grip.from, pointer), field->low, field->high));
}

static void hint_ui(Screen& s, Grip& grip) {
    Session& session = s.session;
    if (session.preferences.hint_seen && grip.hint_since < 0) return;
    double share = 1.0;
    if (session.preferences.hint_seen) share = 1.0 - (session.now - grip.hint_since) / hint_fades;
    if (!(share > 0) || (session.preferences.hint_seen && s.surface.reduced_motion)) {
        grip.hint_since = -1.0;
        return;
    }
    if (grip.figure.handles.empty() || !session.notice.empty()) return;  // a notice stands in its place
    const std::string words = s.areas.picture.width < 520 ? "Drag a grip" : "Drag a round grip: everything follows";
    const double width = std::min(s.areas.picture.width - 16, s.width_of(words, s.small) + 28),
                 height = 32 * s.text / 16;
    const Box pill{s.areas.picture.x + (s.areas.picture.width - width) / 2, s.areas.picture.bottom() - height - 10,
                   width, height};
    s.canvas().box(pill, s.colours.ink.with_alpha(0.92 * share), height / 2);
    s.line({pill.x + 12, pill.y, pill.width - 24, height}, words,
           {s.small, s.colours.paper.with_alpha(share), Across::centre});
}

void picture_ui(Screen& s, Grip& grip, Point pointer) {
    Box area = s.areas.picture;
    Session& session = s.session;
    const ViewRow& view = views()[static_cast<std::size_t>(session.view.view)];
    s.canvas().box(area, s.colours.paper, 0);
    if (view.view == View::pair && area.width > 200 && area.height > 4 * s.areas.row) {
        const double row = std::min(s.areas.row, 44.0);
        area.height -= row;
        section_switches_ui(s, {area.x + 4, area.bottom(), area.width - 8, row});
    }
    if (!(area.width > 60 && area.height > 60)) {
        grip = {};
        return;
    }
    const double pad = s.areas.kind == Areas::Kind::phone || s.areas.kind == Areas::Kind::phone_side ? 4 : 14;
    FigureStyle style;
    style.box = {area.x + pad, area.y + pad, area.width - 2 * pad, area.height - 2 * pad};
    style.dark = s.colours.dark;
    style.units = session.units();
    style.text = s.small;
    style.held = grip.field;
    style.section = session.section;
    style.computing = session.computing;
    style.look = session.view.look;
    s.canvas().push_clip(area);
    grip.figure = view.draw(s.canvas(), session.plan, session.answers, style);
    s.canvas().pop_clip();

    // One item for the whole picture: which grip is meant is decided by nearness.
    const std::string busy = session.computing && view.view == View::pair ? " The section is being computed." : "";
    const Hit hit = s.control("picture", "img", view.name, grip.figure.description + busy, area);
    const bool down = s.topmost && ImGui::IsMouseDown(ImGuiMouseButton_Left);
    if (s.topmost && hit.held && ImGui::IsMouseClicked(ImGuiMouseButton_Left)) {
        if (const Handle* near = handle_near(grip.figure, pointer, s.surface.touch)) {
            session.history.settle(session.plan);
            grip.field = near->field;
            grip.handle = *near;
            grip.from = pointer;
            session.view.focus = "handle." + near->field;
        }
    }
    // Also in the frame of the release: where frames are slow, a whole drag may have come in since the last one.
    if (!grip.field.empty() && std::hypot(pointer.x - grip.from.x, pointer.y - grip.from.y) > 0.5 && pointer.x > -1e5) {
        drag(session, grip, pointer);
        if (!session.preferences.hint_seen) {
            session.preferences.hint_seen = true;
            grip.hint_since = session.now;
        }
    }
    if (!grip.field.empty() && !down) {
        grip.field.clear();
        session.history.settle(session.plan);
    }
    if (s.topmost) {
        const double r = finger_reach;
        for (const Handle& handle : grip.figure.handles) {
            const auto field = find_field(session.plan, handle.field);
            const auto value = number_at(session.plan, handle.field);
            if (!field || !value) continue;
            const std::string id = "handle." + handle.field;
            const Box box = meet({handle.at.x - r, handle.at.y - r, 2 * r, 2 * r}, area);
            s.marks.push_back({id, "slider", handle.name, shown_number(*value, field->quantity, session.units()), box,
                               box.width > 0 && box.height > 0});
            if (!s.presses.empty() && s.presses.front() == id) {
                s.presses.pop_front();
                session.view.focus = id;
            }
            if (session.view.focus == id && !s.surface.touch) s.canvas().ring(handle.at, 17, {s.colours.wave, 1.5});
        }
    }
    if (!session.stale.empty()) {
        const std::string words = "The answers are of the last plan that made sense. " + session.words(session.stale);
        const double width = area.width - 24, height = s.height_of(width - 24, words, s.small) + 16;
        s.canvas().box({area.x + 12, area.y + 10, width, height}, s.colours.panel, 8);
        s.canvas().box({area.x + 12, area.y + 10, 4, height}, s.colours.warn, 2);
        s.paragraph(area.x + 28, area.y + 18, width - 24, words, {s.small, s.colours.warn});
    }
    if (session.stale.empty() && view.view == View::beam)
        hint_ui(s, grip);
    else
        grip.hint_since = -1.0;  // a first visit opens in Beam; in the other views the hint would lie on the grips
}

void tabs_ui(Screen& s) {
    const Box area = s.areas.tabs;
    if (!(area.width > 20 && area.height > 8)) return;
    s.canvas().box(area, s.colours.paper, 0);
    const bool desk = s.areas.kind == Areas::Kind::desktop;
    const double count = static_cast<double>(views().size());
    const double width = desk ? std::min(92.0 * s.text / 15, area.width / count) : area.width / count;
    double x = area.x + (desk ? 8 : 0);
    for (const ViewRow& row : views()) {
        const bool chosen = row.view == s.session.view.view;
        const Box box{x + 3, area.y + 4, width - 6, area.height - 8};
        const Hit hit = s.control(std::string("view.") + row.id, "tab", row.name, chosen ? "chosen" : "", box);
        s.backdrop(box, hit, chosen ? Look::chosen : Look::bare);
        s.line(box, row.name, {s.text, chosen ? s.colours.ink : s.colours.wave, Across::centre, chosen});
        if (hit.pressed) s.session.view.view = row.view;
        x += width;
    }
    if (desk) {
        const std::string says = views()[static_cast<std::size_t>(s.session.view.view)].says;
        s.line({x + 12, area.y, area.right() - x - 24, area.height}, says,
               {s.small, s.colours.soft_ink, Across::right});
    }
    s.hairline(area.x, desk ? area.bottom() - 1 : area.y, area.width);
    if (!desk) s.hairline(area.x, area.bottom() - 1, area.width);
}

}  // namespace gg
