#include "app/window_input.hpp"

#include <GLFW/glfw3.h>
#include <imgui.h>

#include <sstream>

#include "app/desktop_files.hpp"

namespace gg::platform {

namespace {

struct KeyRow {
    int glfw, imgui;
    std::string_view name;  ///< in scripts; empty: not there
};
constexpr KeyRow key_rows[] = {{GLFW_KEY_TAB, ImGuiKey_Tab, "tab"},
                               {GLFW_KEY_LEFT, ImGuiKey_LeftArrow, "left"},
                               {GLFW_KEY_RIGHT, ImGuiKey_RightArrow, "right"},
                               {GLFW_KEY_UP, ImGuiKey_UpArrow, "up"},
                               {GLFW_KEY_DOWN, ImGuiKey_DownArrow, "down"},
                               {GLFW_KEY_PAGE_UP, ImGuiKey_PageUp, "pageup"},
                               {GLFW_KEY_PAGE_DOWN, ImGuiKey_PageDown, "pagedown"},
                               {GLFW_KEY_HOME, ImGuiKey_Home, "home"},
                               {GLFW_KEY_END, ImGuiKey_End, "end"},
                               {GLFW_KEY_INSERT, ImGuiKey_Insert, {}},
                               {GLFW_KEY_DELETE, ImGuiKey_Delete, "delete"},
                               {GLFW_KEY_BACKSPACE, ImGuiKey_Backspace, "backspace"},
                               {GLFW_KEY_SPACE, ImGuiKey_Space, "space"},
                               {GLFW_KEY_ENTER, ImGuiKey_Enter, "enter"},
                               {GLFW_KEY_KP_ENTER, ImGuiKey_KeypadEnter, {}},
                               {GLFW_KEY_ESCAPE, ImGuiKey_Escape, "escape"},
                               {GLFW_KEY_EQUAL, ImGuiKey_Equal, {}},
                               {GLFW_KEY_MINUS, ImGuiKey_Minus, {}},
                               {GLFW_KEY_KP_ADD, ImGuiKey_KeypadAdd, {}},
                               {GLFW_KEY_KP_SUBTRACT, ImGuiKey_KeypadSubtract, {}},
                               {GLFW_KEY_LEFT_CONTROL, ImGuiMod_Ctrl, {}},
                               {GLFW_KEY_RIGHT_CONTROL, ImGuiMod_Ctrl, {}},
                               {GLFW_KEY_LEFT_SHIFT, ImGuiMod_Shift, {}},
                               {GLFW_KEY_RIGHT_SHIFT, ImGuiMod_Shift, {}},
                               {GLFW_KEY_LEFT_ALT, ImGuiMod_Alt, {}},
                               {GLFW_KEY_RIGHT_ALT, ImGuiMod_Alt, {}}};

int key_named(std::string_view name) {
    if (name.size() == 1 && name[0] >= 'a' && name[0] <= 'z') return ImGuiKey_A + (name[0] - 'a');
    if (name.size() == 1 && name[0] >= '0' && name[0] <= '9') return ImGuiKey_0 + (name[0] - '0');
    for (const KeyRow& row : key_rows)
        if (!name.empty() && row.name == name) return row.imgui;
    return 0;
}

/// One line, or false when it is no act.
bool read_act(const std::string& line, Script::Act& act) {
    using Kind = Script::Act::Kind;
    std::istringstream words(line);
    std::string verb;
    words >> verb;
    const auto rest = [&] {
        words >> std::ws;
        std::getline(words, act.words);
        return !act.words.empty();
    };
    if (verb == "move") return act.kind = Kind::move, static_cast<bool>(words >> act.x >> act.y);
    if (verb == "wheel") return act.kind = Kind::wheel, static_cast<bool>(words >> act.y);
    if (verb == "down") return act.kind = Kind::down, true;
    if (verb == "up") return act.kind = Kind::up, true;
    if (verb == "wait") return act.kind = Kind::wait, true;
    if (verb == "type") return act.kind = Kind::type, rest();
    if (verb == "open") return act.kind = Kind::open, rest();
    if (verb != "key") return false;
    act.kind = Kind::key;
    std::string name;
    words >> name;
    constexpr std::string_view control = "ctrl+";
    act.control = name.rfind(control, 0) == 0;
    if (act.control) name.erase(0, control.size());
    act.key = key_named(name);
    return act.key != 0;
}

}  // namespace

int imgui_key(int glfw_key) {
    if (glfw_key >= GLFW_KEY_A && glfw_key <= GLFW_KEY_Z) return ImGuiKey_A + (glfw_key - GLFW_KEY_A);
    if (glfw_key >= GLFW_KEY_0 && glfw_key <= GLFW_KEY_9) return ImGuiKey_0 + (glfw_key - GLFW_KEY_0);
    if (glfw_key >= GLFW_KEY_KP_0 && glfw_key <= GLFW_KEY_KP_9) return ImGuiKey_Keypad0 + (glfw_key - GLFW_KEY_KP_0);
    for (const KeyRow& row : key_rows)
        if (row.glfw == glfw_key) return row.imgui;
    return 0;
}

Script read_script(std::string_view text) {
    Script script;
    std::istringstream lines{std::string(text)};
    int number = 0;
    for (std::string line; std::getline(lines, line);) {
        ++number;
        if (line.find_first_not_of(" \t\r") == std::string::npos || line[0] == '#') continue;
        Script::Act act;
        if (read_act(line, act))
            script.acts.push_back(std::move(act));
        else if (script.fault.empty())
            script.fault = "line " + std::to_string(number) + " of the script is no act: " + line;
    }
    return script;
}

void play(const Script::Act& act, Pointer& pointer, Program& program) {
    using Kind = Script::Act::Kind;
    switch (act.kind) {
        case Kind::move:
            pointer = {act.x, act.y};
            program.pointer_move(pointer.x, pointer.y, false);
            break;
        case Kind::down:
        case Kind::up:
            program.pointer_button(pointer.x, pointer.y, act.kind == Kind::down, false);
            break;
        case Kind::wheel:
            program.wheel(0.0, act.y);
            break;
        case Kind::key:
            if (act.control) program.key(ImGuiMod_Ctrl, true);
            program.key(act.key, true);
            program.key(act.key, false);
            if (act.control) program.key(ImGuiMod_Ctrl, false);
            break;
        case Kind::type:
            for (const unsigned c : code_points(act.words)) program.character(c);
            break;
        case Kind::open:
            if (const auto text = read_file(act.words)) program.opened(Path(act.words).filename().string(), *text);
            break;
        case Kind::wait:
            break;
    }
}

std::vector<unsigned> code_points(std::string_view text) {
    std::vector<unsigned> points;
    for (std::size_t i = 0; i < text.size();) {
        const auto lead = static_cast<unsigned char>(text[i]);
        const std::size_t length = lead < 0x80 ? 1 : lead >= 0xf0 ? 4 : lead >= 0xe0 ? 3 : lead >= 0xc0 ? 2 : 0;
        if (length == 0 || i + length > text.size()) {
            ++i;
            continue;
        }
        unsigned point = length == 1 ? lead : lead & (0x7fu >> length);
        for (std::size_t k = 1; k < length; ++k)
            point = (point << 6) | (static_cast<unsigned char>(text[i + k]) & 0x3f);
        points.push_back(point);
        i += length;
    }
    return points;
}

}  // namespace gg::platform
