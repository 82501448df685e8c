#pragma once
/// What the window hears: GLFW's keys as Dear ImGui's, and scripts that play pointer and keys for tests.
#include <string>
#include <string_view>
#include <vector>

#include "ui/program.hpp"

namespace gg::platform {

/// ImGuiKey of a GLFW key; 0 for keys that the program has no use for.
int imgui_key(int glfw_key);

/// One act a line: "move X Y", "down", "up", "wheel DY", "key NAME" (a letter or digit, "enter", "escape", "tab",
/// "left", "right", "up", "down", "backspace", "ctrl+NAME"), "type WORDS", "open FILE", "wait" (until nothing moves).
/// Lengths in css px, # begins a remark.
struct Script {
    struct Act {
        enum class Kind : unsigned char { move, down, up, wheel, key, type, open, wait };
        Kind kind = Kind::wait;
        double x = 0.0, y = 0.0;
        int key = 0;
        bool control = false;
        std::string words;
    };
    std::vector<Act> acts;
    std::string fault;  ///< one sentence with the line's number; empty: all lines were understood
};
Script read_script(std::string_view text);

/// Where the script's pointer is.
struct Pointer {
    double x = -1.0, y = -1.0;
};
/// Plays one act but "wait", which is the window's own.
void play(const Script::Act& act, Pointer& pointer, Program& program);

/// Code points of UTF-8 text; what is not UTF-8 is left out.
std::vector<unsigned> code_points(std::string_view text);

}  // namespace gg::platform
