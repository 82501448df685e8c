#include "ui/keyboard.hpp"

#include <imgui.h>

#include <algorithm>

namespace gg {

static void nudge(Session& session, double by) {
    std::string key = session.view.focus;
    for (const char* start : {"field.", "handle."})
        if (key.rfind(start, 0) == 0) {
            key.erase(0, std::string_view(start).size());
            const auto field = find_field(session.plan, key);
            const auto value = number_at(session.plan, key);
            if (field && value) session.set(key, std::clamp(*value + by * field->step, field->low, field->high));
            return;
        }
}

static void move_focus(Session& session, Scrolls& scrolls, const std::vector<Mark>& marks, int by) {
    std::vector<const Mark*> stops;
    for (const Mark& mark : marks)
        if (mark.role != "img" && mark.id.rfind("scroll.", 0) != 0) stops.push_back(&mark);
    if (stops.empty()) return;
    const auto now =
        std::find_if(stops.begin(), stops.end(), [&](const Mark* m) { return m->id == session.view.focus; });
    const auto count = static_cast<std::ptrdiff_t>(stops.size());
    const std::ptrdiff_t next =
        now == stops.end() ? (by > 0 ? 0 : count - 1) : (now - stops.begin() + by + count) % count;
    const Mark& mark = *stops[static_cast<std::size_t>(next)];
    session.view.focus = mark.id;
    if (mark.shown) return;
    for (const auto& [id, region] : scrolls.all()) {
        if (!region.seen || region.across || mark.box.x < region.box.x || mark.box.right() > region.box.right())
            continue;
        scrolls[id].at = std::clamp(region.at + mark.box.y - region.box.y - region.box.height / 3, 0.0, region.most);
    }
}

void act_on_keys(Session& session, Scrolls& scrolls, const std::vector<Mark>& marks, std::deque<std::string>& presses) {
    ImGuiIO& io = ImGui::GetIO();
    const auto struck = [](ImGuiKey key, bool repeat = false) { return ImGui::IsKeyPressed(key, repeat); };
    if (struck(ImGuiKey_Escape)) {
        if (!session.view.sheets.empty())
            session.close();
        else if (!session.view.edit.key.empty())
            session.view.edit = {};
        else
            session.view.focus.clear();
    }
    if (io.WantTextInput) return;
    if (io.KeyCtrl && struck(ImGuiKey_Z, true)) io.KeyShift ? session.redo() : session.undo();
    if (io.KeyCtrl && struck(ImGuiKey_Y, true)) session.redo();
    if (struck(ImGuiKey_Tab, true)) move_focus(session, scrolls, marks, io.KeyShift ? -1 : 1);
    if (struck(ImGuiKey_UpArrow, true) || struck(ImGuiKey_RightArrow, true)) nudge(session, 1);
    if (struck(ImGuiKey_DownArrow, true) || struck(ImGuiKey_LeftArrow, true)) nudge(session, -1);
    const bool typing = !session.view.sheets.empty() && (session.view.sheets.back().kind == Sheet::Kind::keypad ||
                                                         session.view.sheets.back().kind == Sheet::Kind::rename);
    if (typing) return;
    if ((struck(ImGuiKey_Enter) || struck(ImGuiKey_Space)) && !session.view.focus.empty())
        presses.push_back(session.view.focus);
    if (io.KeyCtrl || io.KeyAlt || !session.view.sheets.empty()) return;
    for (std::size_t i = 0; i < views().size() && i < 9; ++i)
        if (struck(static_cast<ImGuiKey>(ImGuiKey_1 + static_cast<int>(i)))) session.view.view = views()[i].view;
}

}  // namespace gg
