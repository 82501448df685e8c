/// The browser page's side of the program: a flat set of functions that web/shell calls. The shell owns the clock, the
/// events and the storage; here is only the translation, and the drawing by WebGL 2. A worker beside the page runs the
/// same code and calls nothing of it but gg_reckon().
/// Texts come in as pointer and length, UTF-8, and go out through `text_out`: the pointer is returned, gg_length()
/// gives the length, and both stand until the next call.
#include <GLES3/gl3.h>
#include <emscripten/emscripten.h>
#include <emscripten/html5.h>
#include <imgui.h>
#include <imgui_impl_opengl3.h>

#include <cmath>
#include <memory>
#include <nlohmann/json.hpp>
#include <string>

#include "app/platform.hpp"
#include "paper/pair_desk.hpp"
#include "ui/program.hpp"
#include "wave/embedded.hpp"

namespace gg::platform {
std::string_view font() { return embedded::font_ttf(); }
}  // namespace gg::platform

namespace {

struct Page {
    gg::Program program{gg::platform::font()};
    EMSCRIPTEN_WEBGL_CONTEXT_HANDLE context = 0;
    bool drawing = false;  ///< a WebGL context is there and not lost
};

/// The only globals: the C functions below have no other way to their state.
std::unique_ptr<Page> page;
std::unique_ptr<gg::PairDesk> desk;
std::string text_out;

const char* give(std::string text) {
    text_out = std::move(text);
    return text_out.c_str();
}

const char* word_for(gg::Request::Kind kind) {
    using Kind = gg::Request::Kind;
    switch (kind) {
        case Kind::store:
            return "store";
        case Kind::save_file:
            return "save_file";
        case Kind::open_file:
            return "open_file";
        case Kind::edit_text:
            return "edit_text";
        case Kind::copy:
            return "copy";
        case Kind::announce:
            return "announce";
        case Kind::reckon:
            return "reckon";
    }
    return "";
}

/// Keys by their name in the DOM (KeyboardEvent.key; letters as capitals). Others are no business of the program.
int key_of(std::string_view name) {
    static constexpr struct {
        std::string_view name;
        int key;
    } rows[] = {{"Tab", ImGuiKey_Tab},
                {"ArrowLeft", ImGuiKey_LeftArrow},
                {"ArrowRight", ImGuiKey_RightArrow},
                {"ArrowUp", ImGuiKey_UpArrow},
                {"ArrowDown", ImGuiKey_DownArrow},
                {"PageUp", ImGuiKey_PageUp},
                {"PageDown", ImGuiKey_PageDown},
                {"Home", ImGuiKey_Home},
                {"End", ImGuiKey_End},
                {"Delete", ImGuiKey_Delete},
                {"Backspace", ImGuiKey_Backspace},
                {" ", ImGuiKey_Space},
                {"Enter", ImGuiKey_Enter},
                {"Escape", ImGuiKey_Escape},
                {"Control", ImGuiMod_Ctrl},
                {"Shift", ImGuiMod_Shift},
                {"Alt", ImGuiMod_Alt},
                {"+", ImGuiKey_Equal},
                {"-", ImGuiKey_Minus}};
    if (name.size() == 1 && name[0] >= 'A' && name[0] <= 'Z') return ImGuiKey_A + (name[0] - 'A');
    if (name.size() == 1 && name[0] >= '0' && name[0] <= '9') return ImGuiKey_0 + (name[0] - '0');
    for (const auto& row : rows)
        if (row.name == name) return row.key;
    return 0;
}

void draw() {
    emscripten_webgl_make_context_current(page->context);
    const ImVec2 size = ImGui::GetIO().DisplaySize;
    glViewport(0, 0, static_cast<int>(size.x), static_cast<int>(size.y));
    ImGui_ImplOpenGL3_RenderDrawData(ImGui::GetDrawData());
}

}  // namespace

extern "C" {

/// Makes the program and its drawing surface. Returns 1, or 0 where there is no WebGL 2: the program runs all the same,
/// and the page shows it as text.
EMSCRIPTEN_KEEPALIVE int gg_start() {
    page = std::make_unique<Page>();
    EmscriptenWebGLContextAttributes attributes;
    emscripten_webgl_init_context_attributes(&attributes);
    attributes.majorVersion = 2;
    attributes.alpha = attributes.depth = attributes.stencil = attributes.antialias = false;
    attributes.powerPreference = EM_WEBGL_POWER_PREFERENCE_LOW_POWER;
    page->context = emscripten_webgl_create_context("#surface", &attributes);
    if (page->context <= 0) return 0;
    emscripten_webgl_make_context_current(page->context);
    page->drawing = ImGui_ImplOpenGL3_Init("#version 300 es");
    return page->drawing ? 1 : 0;
}

/// The objects of a lost context can be forgotten silently now, and no longer after it came back.
EMSCRIPTEN_KEEPALIVE void gg_context_lost() {
    if (page->drawing) ImGui_ImplOpenGL3_Shutdown();
    page->drawing = false;
}
EMSCRIPTEN_KEEPALIVE void gg_context_restored() {
    emscripten_webgl_make_context_current(page->context);
    page->drawing = ImGui_ImplOpenGL3_Init("#version 300 es");
}

/// @param flags  1 system is dark, 2 reduced motion, 4 the last pointer was a finger
EMSCRIPTEN_KEEPALIVE void gg_surface(double width, double height, double ratio, double top, double right, double bottom,
                                     double left, int flags) {
    gg::Surface s;
    s.width = width, s.height = height, s.pixel_ratio = ratio;
    s.inset_top = top, s.inset_right = right, s.inset_bottom = bottom, s.inset_left = left;
    s.system_dark = flags & 1, s.reduced_motion = flags & 2, s.touch = flags & 4;
    page->program.set_surface(s);
}

EMSCRIPTEN_KEEPALIVE void gg_move(double x, double y, int touch) { page->program.pointer_move(x, y, touch); }
EMSCRIPTEN_KEEPALIVE void gg_leave() { page->program.pointer_leave(); }
EMSCRIPTEN_KEEPALIVE void gg_button(double x, double y, int down, int touch) {
    page->program.pointer_button(x, y, down, touch);
}
EMSCRIPTEN_KEEPALIVE void gg_wheel(double dx, double dy) { page->program.wheel(dx, dy); }
EMSCRIPTEN_KEEPALIVE void gg_pinch(double x, double y, double scale) { page->program.pinch(x, y, scale); }
/// Returns 1 where the program knows that key.
EMSCRIPTEN_KEEPALIVE int gg_key(const char* name, int length, int down) {
    const int key = key_of({name, static_cast<std::size_t>(length)});
    if (key) page->program.key(key, down);
    return key != 0;
}
EMSCRIPTEN_KEEPALIVE void gg_character(int codepoint) { page->program.character(static_cast<unsigned>(codepoint)); }
EMSCRIPTEN_KEEPALIVE void gg_typed(const char* name, int name_length, const char* text, int length, int keep) {
    page->program.typed({name, static_cast<std::size_t>(name_length)}, {text, static_cast<std::size_t>(length)}, keep);
}
EMSCRIPTEN_KEEPALIVE void gg_opened(const char* name, int name_length, const char* text, int length) {
    page->program.opened({name, static_cast<std::size_t>(name_length)}, {text, static_cast<std::size_t>(length)});
}
EMSCRIPTEN_KEEPALIVE void gg_restore(const char* name, int name_length, const char* text, int length) {
    page->program.restore({name, static_cast<std::size_t>(name_length)}, {text, static_cast<std::size_t>(length)});
}
EMSCRIPTEN_KEEPALIVE void gg_reckoned(const char* answer, int length) {
    page->program.reckoned({answer, static_cast<std::size_t>(length)});
}
EMSCRIPTEN_KEEPALIVE void gg_press(const char* id, int length) {
    page->program.press({id, static_cast<std::size_t>(length)});
}
/// 1 while a text field inside the surface takes characters.
EMSCRIPTEN_KEEPALIVE int gg_wants_text() { return ImGui::GetIO().WantTextInput; }

/// One frame at `now` s. Returns the seconds until the next is due, or -1 when nothing moves.
/// @param show  0: only works the input off (a shell in the middle of a tap wants the requests, not the picture)
EMSCRIPTEN_KEEPALIVE double gg_frame(double now, int show) {
    gg::Program& program = page->program;
    if (page->drawing) ImGui_ImplOpenGL3_NewFrame();
    program.frame(now);
    if (program.font_changed() && page->drawing) {
        emscripten_webgl_make_context_current(page->context);
        ImGui_ImplOpenGL3_DestroyFontsTexture();
        ImGui_ImplOpenGL3_CreateFontsTexture();
        program.frame(now);  // the frame just built still names the old texture
    }
    if (page->drawing && show) draw();
    const double wake = program.wake_after();
    return std::isfinite(wake) ? wake : -1.0;
}

/// What the program asks of the page: a JSON list, or an empty text.
EMSCRIPTEN_KEEPALIVE const char* gg_requests() {
    const auto requests = page->program.take_requests();
    if (requests.empty()) return give({});
    nlohmann::json list = nlohmann::json::array();
    for (const auto& r : requests)
        list.push_back({{"kind", word_for(r.kind)},
                        {"name", r.name},
                        {"text", r.text},
                        {"x", r.x},
                        {"y", r.y},
                        {"width", r.width},
                        {"height", r.height}});
    return give(list.dump(-1, ' ', false, nlohmann::json::error_handler_t::replace));
}
EMSCRIPTEN_KEEPALIVE const char* gg_controls() { return give(page->program.controls_json()); }
EMSCRIPTEN_KEEPALIVE const char* gg_answers() { return give(page->program.answers_json()); }
EMSCRIPTEN_KEEPALIVE const char* gg_plan() { return give(page->program.plan_json()); }
/// The bytes that answer an order of the program's; may take seconds.
EMSCRIPTEN_KEEPALIVE const char* gg_reckon(const char* order, int length) {
    if (!desk) desk = std::make_unique<gg::PairDesk>();
    return give(desk->answer({order, static_cast<std::size_t>(length)}));
}
EMSCRIPTEN_KEEPALIVE int gg_length() { return static_cast<int>(text_out.size()); }

}  // extern "C"
