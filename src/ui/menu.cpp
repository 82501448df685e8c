// The one menu, and the sheets behind it.
#include <imgui.h>

#include <algorithm>
#include <cctype>

#include "paper/plan_file.hpp"
#include "ui/parts.hpp"

namespace gg {

/// "yard-pipe-wet-clay.json"
static std::string file_name(const std::string& name) {
    std::string out;
    for (const char c : name) {
        if (std::isalnum(static_cast<unsigned char>(c)))
            out += static_cast<char>(std::tolower(static_cast<unsigned char>(c)));
        else if (!out.empty() && out.back() != '-')
            out += '-';
    }
    while (!out.empty() && out.back() == '-') out.pop_back();
    return (out.empty() ? "plan" : out) + ".json";
}

/// A row of alternatives, one of them chosen; gives the index tapped, or -1.
static int segments(Screen& s, const std::string& id, std::string_view label, const std::vector<std::string>& names,
                    int chosen, double x, double& y, double width) {
    int tapped = -1;
    const double row = s.areas.row, left = std::min(0.3 * width, 110 * s.text / 16),
                 part = (width - left) / static_cast<double>(names.size());
    s.label({x, y, left - 8, row}, label);
    for (int i = 0; i < static_cast<int>(names.size()); ++i) {
        const std::string& name = names[static_cast<std::size_t>(i)];
        const Box box{x + left + i * part + 2, y + 3, part - 4, row - 6};
        const Hit hit = s.control(id + "." + std::to_string(i), "option", std::string(label) + ": " + name,
                                  i == chosen ? "chosen" : "", box);
        s.backdrop(box, hit, i == chosen ? Look::chosen : Look::quiet);
        s.line({box.x + 4, box.y, box.width - 8, box.height}, name,
               {s.text, s.colours.ink, Across::centre, i == chosen});
        if (hit.pressed) tapped = i;
    }
    y += row;
    return tapped;
}

void menu_ui(Screen& s) {
    Session& session = s.session;
    const Box box = sheet_frame(s, "Menu", 11 * s.areas.row + 70);
    const double x = box.x, width = box.width, row = s.areas.row;
    double y = s.begin_scroll("menu", {box.x - 8, box.y, box.width + 16, box.height}) + 4;
    const auto act = [&](const char* id, const char* name) {
        const bool pressed = lead_row(s, id, name, {}, {x, y, width, row});
        y += row;
        return pressed;
    };
    if (act("menu.demos", "New from an example")) session.show(Sheet::Kind::demos);
    if (act("menu.open", "Open a plan file"))
        session.requests.push_back({Request::Kind::open_file, "plan", {}}), session.close();
    if (act("menu.save", "Save as a plan file")) {
        session.requests.push_back({Request::Kind::save_file, file_name(session.plan.name), write_plan(session.plan)});
        session.close();
    }
    if (act("menu.rename", "Rename this plan")) session.show(Sheet::Kind::rename);
    if (act("menu.inputs", "All inputs")) session.show(Sheet::Kind::inputs);
    s.hairline(x, y, width);
    const double half = width / 2;
    if (s.button("menu.undo", "Undo", {x, y + 4, half - 4, row - 8}, Look::quiet)) session.undo();
    if (s.button("menu.redo", "Redo", {x + half + 4, y + 4, half - 4, row - 8}, Look::quiet)) session.redo();
    y += row;
    s.hairline(x, y, width);
    Preferences& likes = session.preferences;
    if (const int i = segments(s, "units", "Units", {"Metric", "Imperial"}, static_cast<int>(likes.units), x, y, width);
        i >= 0)
        likes.units = static_cast<UnitSystem>(i);
    if (const int i =
            segments(s, "theme", "Light", {"System", "Day", "Night"}, static_cast<int>(likes.theme), x, y, width);
        i >= 0)
        likes.theme = static_cast<Theme>(i);
    constexpr double scales[] = {1.0, 1.25, 1.5};
    int size = 0;
    for (int i = 0; i < 3; ++i)
        if (likes.text_scale >= scales[i] - 0.01) size = i;
    if (const int i = segments(s, "text", "Text", {"100 %", "125 %", "150 %"}, size, x, y, width); i >= 0)
        likes.text_scale = scales[i];
    s.hairline(x, y, width);
    if (act("menu.about", "About, and cautions")) session.show(Sheet::Kind::about);
    y = s.paragraph(x, y + 4, width, caution(), {s.small, s.colours.soft_ink});
    s.end_scroll(y + 12);
}

void demos_ui(Screen& s) {
    const Box box = sheet_frame(s, "New from an example", 10 * s.areas.row);
    double y = s.begin_scroll("demos", {box.x - 8, box.y, box.width + 16, box.height}) + 4;
    std::string chosen;
    for (const Demo& demo : demos()) {
        const ReadPlan read = read_plan(demo.json);
        const double note = s.height_of(box.width - 24, read.plan.note, s.small);
        const Box line{box.x - 4, y, box.width + 8, s.areas.row + note};
        const Hit hit = s.control("demo." + demo.id, "button", demo.name, {}, line);
        s.backdrop(line, hit, Look::bare);
        s.line({box.x + 8, y, box.width - 24, s.areas.row - 8}, demo.name,
               {s.text, s.colours.wave, Across::left, true});
        s.paragraph(box.x + 8, y + s.areas.row - 12, box.width - 24, read.plan.note, {s.small, s.colours.soft_ink});
        if (hit.pressed) chosen = demo.json;
        y += line.height + 6;
    }
    s.end_scroll(y + 8);
    if (chosen.empty()) return;
    ReadPlan read = read_plan(chosen);
    if (read.ok()) s.session.open(std::move(read.plan), "A new plan from an example. Undo brings the last one back.");
}

void rename_ui(Screen& s) {
    Session& session = s.session;
    const Box box = sheet_frame(s, "Name of this plan", 4 * s.areas.row + 20, true);
    const Box field{box.x, box.y + 12, box.width, s.areas.row};
    Edit& edit = session.view.edit;
    const bool begin = edit.key != "name";
    if (begin) {
        edit = {"name", session.plan.name, {}, false, true};
        // Where there is no keyboard the platform lays its own text field over ours.
        if (s.surface.touch)
            session.requests.push_back(
                {Request::Kind::edit_text, "name", session.plan.name, field.x, field.y, field.width, field.height});
    }
    if (!s.topmost) return;
    s.marks.push_back({"name", "textbox", "Name of this plan", edit.text, field, true});
    typing_field(s, "name", edit.text, field, false, begin && !s.surface.touch);
    const bool done = ImGui::IsKeyPressed(ImGuiKey_Enter, false) || ImGui::IsKeyPressed(ImGuiKey_KeypadEnter, false);
    if (s.button("name.ok", "OK", {box.x, field.bottom() + 12, box.width, s.areas.row}, Look::strong) || done) {
        if (!edit.text.empty()) session.plan.name = edit.text;
        session.history.settle(session.plan);
        session.close();
    }
}

void about_ui(Screen& s) {
    const Box box = sheet_frame(s, "Groundgrain", 620);
    double y = s.begin_scroll("about", {box.x - 8, box.y, box.width + 16, box.height}) + 10;
    const auto say_so = [&](std::string_view words, bool strong = false) {
        y = s.paragraph(box.x, y, box.width, words,
                        {s.text, strong ? s.colours.wave : s.colours.ink, Across::left, strong}) +
            8;
    };
    say_so("Cautions", true);
    say_so(caution());
    say_so("What it does", true);
    say_so(
        "It forecasts how fine a picture of the ground a radar survey will give, from the ground, the target, the "
        "antenna and the lines "
        "that you enter. Every number says how it was computed and which published rule stands beside it; a range you "
        "give goes through "
        "to the answer.");
    say_so("What stays private", true);
    say_so("Everything. Plans stay on this device, and leave it only as files that you save.");
    say_so("Made with", true);
    say_so(
        "Dear ImGui (MIT licence), DejaVu Sans (free licence of Bitstream Vera), Eigen (MPL 2), JSON for Modern C++ "
        "(MIT licence).");
    s.end_scroll(y + 8);
}

}  // namespace gg
