// Typing a number: a keypad for thumbs, a text field where there is a keyboard.
#include <imgui.h>
#include <imgui_internal.h>

#include <algorithm>
#include <cmath>
#include <cstring>

#include "ui/parts.hpp"
#include "ui/typeface.hpp"

namespace gg {

bool typing_field(Screen& s, const char* id, std::string& text, Box box, bool number, bool begin) {
    char buffer[256];
    const std::size_t n = std::min(text.size(), sizeof buffer - 1);
    std::memcpy(buffer, text.data(), n);
    buffer[n] = 0;
    const auto px = [&](double v) { return static_cast<float>(v * s.ratio); };
    ImFont* font = font_for(s.text * box_per_em * s.ratio);
    ImGui::PushFont(font);
    ImGui::PushStyleVar(ImGuiStyleVar_FramePadding, {px(8), std::max(0.0f, (px(box.height) - font->FontSize) / 2)});
    ImGui::SetCursorScreenPos({px(box.x), px(box.y)});
    ImGui::SetNextItemWidth(px(box.width));
    if (begin) ImGui::SetKeyboardFocusHere();
    const ImGuiInputTextFlags flags = ImGuiInputTextFlags_AutoSelectAll | ImGuiInputTextFlags_EnterReturnsTrue |
                                      (number ? ImGuiInputTextFlags_CharsNoBlank : 0);
    const bool entered = ImGui::InputText((std::string("##") + id).c_str(), buffer, sizeof buffer, flags);
    const bool left = ImGui::IsItemDeactivated();
    ImGui::PopStyleVar();
    ImGui::PopFont();
    text = buffer;
    return entered || left;
}

/// One key's effect on the text.
static void type(Edit& edit, std::string_view key) {
    if (key == "clear") {
        edit.text.clear();
    } else if (key == "erase") {
        if (edit.fresh) edit.text.clear();
        if (!edit.text.empty()) edit.text.pop_back();
    } else if (key == "sign") {
        if (!edit.text.empty() && edit.text[0] == '-')
            edit.text.erase(edit.text.begin());
        else
            edit.text.insert(edit.text.begin(), '-');
    } else {
        if (edit.fresh) edit.text.clear();
        const bool second_point = key == "." && edit.text.find_first_of(".,") != std::string::npos;
        if (edit.text.size() < 16 && !second_point) edit.text += key;
    }
    edit.fresh = false;
    edit.fault.clear();
}

/// What is typed on a real keyboard while the keypad is up.
static void keyboard(Session& session) {
    for (const ImWchar c : ImGui::GetIO().InputQueueCharacters) {
        if (c >= '0' && c <= '9') type(session.view.edit, std::string(1, static_cast<char>(c)));
        if (c == '.' || c == ',') type(session.view.edit, ".");
        if (c == '-') type(session.view.edit, "sign");
    }
    if (ImGui::IsKeyPressed(ImGuiKey_Backspace)) type(session.view.edit, "erase");
    if (ImGui::IsKeyPressed(ImGuiKey_Delete)) type(session.view.edit, "clear");
}

/// Low, likely, high: which of the three is typed. Going to another takes what was typed first.
static double range_ui(Screen& s, const std::string& base, double x, double y, double width) {
    Session& session = s.session;
    const auto field = find_field(session.plan, base);
    const auto low = number_at(session.plan, base + ".low"), high = number_at(session.plan, base + ".high");
    if (!field || !field->is_range || !low || !high) return y;
    const double row = s.areas.row;
    if (session.view.edit.key == base && !(*high > *low)) {
        if (s.button("range", "Not exactly known: give a range", {x, y, width, row}, Look::bare))
            session.begin_edit(base + ".low");
        return y + row + 4;
    }
    struct End {
        const char *suffix, *name;
    };
    constexpr End ends[] = {{".low", "Low"}, {"", "Likely"}, {".high", "High"}};
    const double part = width / 3;
    for (int i = 0; i < 3; ++i) {
        const std::string key = base + ends[i].suffix;
        const bool chosen = session.view.edit.key == key;
        const Box box{x + i * part + 2, y, part - 4, row + 8};
        const std::string value =
            shown_number(number_at(session.plan, key).value_or(0), field->quantity, session.units(), true);
        const Hit hit = s.control(std::string("range.") + ends[i].name, "tab", ends[i].name, value, box);
        s.backdrop(box, hit, chosen ? Look::chosen : Look::quiet);
        s.line({box.x, box.y + 4, box.width, box.height / 2 - 4}, ends[i].name,
               {s.small, s.colours.soft_ink, Across::centre});
        s.line({box.x + 4, box.y + box.height / 2, box.width - 8, box.height / 2 - 6}, value,
               {s.text, s.colours.ink, Across::centre, chosen});
        if (hit.pressed && !chosen && session.commit_edit()) session.begin_edit(key);
    }
    return y + row + 16;
}

void keypad_ui(Screen& s) {
    Session& session = s.session;
    const std::string base = session.view.sheets.back().key;
    const auto field = find_field(session.plan, base);
    if (!field) return session.close();
    if (session.view.edit.key.rfind(base, 0) != 0) session.begin_edit(base);
    const bool keys = s.surface.touch || s.areas.kind != Areas::Kind::desktop;
    const double key = std::max(s.areas.row + 4, 52.0),
                 fault_lines = session.view.edit.fault.empty() ? 0 : 2.8 * s.text;
    const double wanted =
        s.areas.row + 8 + 64 + fault_lines + (field->is_range ? s.areas.row + 16 : 0) + 4 * (key + 6) + 40;
    const Box box = sheet_frame(s, field->label, wanted, true);
    if (s.topmost) keyboard(session);
    const double x = box.x, width = box.width;
    double y = s.begin_scroll("keypad", {box.x - 4, box.y, box.width + 8, box.height}) + 8;

    Edit& edit = session.view.edit;
    const std::string unit = typed_unit(field->quantity, session.units()).name;
    const double tall = std::round(s.large * 2.4), unit_width = unit.empty() ? 0 : s.width_of(unit, s.large) + 12;
    const Box value{x, y, width, tall};
    s.canvas().box(value, s.colours.panel, 8);
    s.canvas().box({x, y + tall - 2, width, 2}, edit.fault.empty() ? s.colours.wave : s.colours.warn, 1);
    if (s.topmost) s.marks.push_back({"typed", "spinbutton", field->label, edit.text, meet(value, s.visible()), true});
    const double room = width - unit_width - 28;
    const double written = std::min(room, s.width_of(edit.text, s.large));
    if (edit.fresh)
        s.canvas().box({x + width - unit_width - 18 - written, y + 8, written + 8, tall - 16}, s.colours.wave_soft, 4);
    s.line({x + 12, y, room + 2, tall}, edit.text, {s.large, s.colours.ink, Across::right});
    s.canvas().box({x + width - unit_width - 11, y + 10, 2, tall - 20}, s.colours.wave, 0);
    s.line({x + width - unit_width, y, unit_width - 8, tall}, unit, {s.large, s.colours.soft_ink, Across::right});
    y += tall + 6;
    if (!edit.fault.empty()) y = s.paragraph(x, y, width, edit.fault, {s.text, s.colours.warn}) + 6;
    y = range_ui(s, base, x, y, width);

    bool done =
        s.topmost && (ImGui::IsKeyPressed(ImGuiKey_Enter, false) || ImGui::IsKeyPressed(ImGuiKey_KeypadEnter, false));
    const double column = width / 4;
    const auto at = [&](int c, int r, int wide = 1) {
        return Box{x + c * column + 2, y + r * (key + 6), wide * column - 4, key};
    };
    if (keys) {
        constexpr const char* digits[] = {"7", "8", "9", "4", "5", "6", "1", "2", "3"};
        for (int i = 0; i < 9; ++i)
            if (s.button(std::string("key.") + digits[i], digits[i], at(i % 3, i / 3), Look::quiet))
                type(edit, digits[i]);
        if (s.button("key.0", "0", at(0, 3), Look::quiet)) type(edit, "0");
        if (s.button("key.point", ".", at(1, 3), Look::quiet, "point")) type(edit, ".");
        if (field->low < 0) {
            if (s.button("key.sign", "\u00b1", at(2, 3), Look::quiet, "plus or minus")) type(edit, "sign");
        }
        if (s.sign_button("key.erase", Screen::Sign::erase, "Delete", at(3, 0), Look::quiet, true)) type(edit, "erase");
        if (s.button("key.clear", "Clear", at(3, 1), Look::quiet)) type(edit, "clear");
        Box ok = at(3, 2);
        ok.height = 2 * key + 6;
        done |= s.button("key.ok", "OK", ok, Look::strong);
        y += 4 * (key + 6);
    } else {
        done |= s.button("key.ok", "OK", {x, y, width, key}, Look::strong);
        y += key + 6;
    }
    s.end_scroll(y + 8);
    if (done && session.commit_edit()) session.close();
}

}  // namespace gg
