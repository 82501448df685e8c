#include "ui/program.hpp"

#include <imgui.h>
#include <imgui_internal.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

#include "paper/plan_file.hpp"
#include "ui/keyboard.hpp"
#include "ui/parts.hpp"
#include "ui/section_work.hpp"
#include "ui/theme.hpp"
#include "ui/typeface.hpp"

namespace gg {

static constexpr int frames_after_input = 3;  // ImGui settles hover, press and release within this many
static constexpr double store_after = 0.3;    // s a plan is still before it is kept on the device

struct Program::State final : PointerOut {
    std::string_view font;
    ImGuiContext* context = nullptr;
    Surface surface;
    Session session;
    Scrolls scrolls;
    Finger finger;
    Grip grip;
    SectionWork section;
    std::vector<Mark> marks;
    std::deque<std::string> presses;
    std::vector<double> font_sizes;
    double font_ratio = 0.0, themed_ratio = 0.0;
    const Palette* themed = nullptr;
    bool font_changed = false, moving = false, was_down = false, touch_events = false;
    int frames_left = frames_after_input;
    Plan stored_plan, seen_plan;
    double changed_at = 0.0;
    Preferences stored_preferences;

    // ---- PointerOut ----
    void source() {
        ImGui::GetIO().AddMouseSourceEvent(touch_events ? ImGuiMouseSource_TouchScreen : ImGuiMouseSource_Mouse);
    }
    void at(Point p) override {
        source();
        ImGui::GetIO().AddMousePosEvent(static_cast<float>(p.x * surface.pixel_ratio),
                                        static_cast<float>(p.y * surface.pixel_ratio));
    }
    void away() override {
        source();
        ImGui::GetIO().AddMousePosEvent(-FLT_MAX, -FLT_MAX);
    }
    void button(bool down) override {
        source();
        ImGui::GetIO().AddMouseButtonEvent(0, down);
    }

    void enter() { ImGui::SetCurrentContext(context); }
    void touched(bool touch) {
        enter();
        touch_events = touch;
        surface.touch = touch;
        frames_left = frames_after_input;
    }
    bool dark() const {
        return session.preferences.theme == Theme::dark ||
               (session.preferences.theme == Theme::system && surface.system_dark);
    }
    void fit_typeface(const Screen& screen);
    /// Orders the next step of Pair's section, where it is open, and takes in the last.
    void work_on_section();
    void draw(Screen& screen);
    void keep();
};

Program::Program(std::string_view font) : state_(std::make_unique<State>()) {
    State& s = *state_;
    s.font = font;
    s.context = ImGui::CreateContext();
    s.enter();
    ImGuiIO& io = ImGui::GetIO();
    io.IniFilename = nullptr;
    io.LogFilename = nullptr;
    io.ConfigInputTextCursorBlink = false;  // a blinking caret would keep an idle screen drawing
    io.MouseDragThreshold = 4.0f;
    s.stored_plan = s.seen_plan = s.session.plan;
}

Program::~Program() {
    state_->enter();
    ImGui::DestroyContext(state_->context);
}

void Program::set_surface(const Surface& surface) {
    State& s = *state_;
    s.surface = surface;
    if (!(surface.pixel_ratio > 0.1 && surface.pixel_ratio < 20)) s.surface.pixel_ratio = 1;
    if (!(surface.width > 0 && surface.width < 1e5)) s.surface.width = 0;
    if (!(surface.height > 0 && surface.height < 1e5)) s.surface.height = 0;
    s.frames_left = frames_after_input;
}

// ---- input ----

void Program::pointer_move(double x, double y, bool touch) {
    State& s = *state_;
    s.touched(touch);
    if (touch)
        s.finger.move({x, y}, s.scrolls, s);
    else
        s.at({x, y});
}

void Program::pointer_leave() {
    State& s = *state_;
    s.enter();
    s.frames_left = frames_after_input;
    if (s.finger.on_glass())
        s.finger.cancel(s);
    else
        s.away();
}

void Program::pointer_button(double x, double y, bool down, bool touch) {
    State& s = *state_;
    s.touched(touch);
    if (touch && down) {
        const bool grip =
            s.session.view.sheets.empty() && s.surface.width > 0 && handle_near(s.grip.figure, {x, y}, true);
        s.finger.down({x, y}, grip, s);
    } else if (touch) {
        s.finger.up({x, y}, s);
    } else {
        s.at({x, y});
        s.button(down);
    }
}

void Program::wheel(double dx, double dy) {
    State& s = *state_;
    s.enter();
    s.frames_left = frames_after_input;
    const ImVec2 mouse = ImGui::GetIO().MousePos;
    const Point p{mouse.x / s.surface.pixel_ratio, mouse.y / s.surface.pixel_ratio};
    constexpr double notch = 60.0;  // css px
    if (Scroll* scroll = s.scrolls.under(p, false); scroll && dy != 0)
        scroll->at = std::clamp(scroll->at - dy * notch, 0.0, scroll->most);
    if (Scroll* scroll = s.scrolls.under(p, true); scroll && (dx != 0 || dy != 0)) {
        const double turn = dx != 0 ? dx : dy;
        if (scroll->page > 0)
            scroll->at = std::clamp(scroll->at - std::copysign(0.55 * scroll->page, turn), 0.0, scroll->most);
        else
            scroll->at = std::clamp(scroll->at - turn * notch, 0.0, scroll->most);
    }
}

void Program::pinch(double, double, double) {
    State& s = *state_;
    s.touched(true);
    s.finger.cancel(s);
}

void Program::key(int imgui_key, bool down) {
    State& s = *state_;
    s.enter();
    s.frames_left = frames_after_input;
    ImGuiIO& io = ImGui::GetIO();
    const auto key = static_cast<ImGuiKey>(imgui_key);
    const bool is_mod = key == ImGuiMod_Ctrl || key == ImGuiMod_Shift || key == ImGuiMod_Alt || key == ImGuiMod_Super;
    if (!is_mod && !(key >= ImGuiKey_NamedKey_BEGIN && key < ImGuiKey_NamedKey_END)) return;
    if (key == ImGuiKey_LeftCtrl || key == ImGuiKey_RightCtrl || key == ImGuiKey_LeftSuper)
        io.AddKeyEvent(ImGuiMod_Ctrl, down);
    if (key == ImGuiKey_LeftShift || key == ImGuiKey_RightShift) io.AddKeyEvent(ImGuiMod_Shift, down);
    io.AddKeyEvent(key, down);
}

void Program::character(unsigned codepoint) {
    state_->enter();
    state_->frames_left = frames_after_input;
    ImGui::GetIO().AddInputCharacter(codepoint);
}

void Program::typed(std::string_view name, std::string_view text, bool keep) {
    Session& session = state_->session;
    state_->frames_left = frames_after_input;
    if (name == "name") {
        if (keep && !text.empty()) session.plan.name = std::string(text);
        session.history.settle(session.plan);
        if (!session.view.sheets.empty() && session.view.sheets.back().kind == Sheet::Kind::rename) session.close();
        return;
    }
    if (!keep || !find_field(session.plan, name)) return;
    session.begin_edit(name);
    session.view.edit.text = std::string(text);
    session.view.edit.fresh = false;
    if (session.commit_edit())
        session.view.edit = {};
    else
        session.say_notice(session.view.edit.fault);
}

void Program::opened(std::string_view file_name, std::string_view contents) {
    state_->frames_left = frames_after_input;
    const std::string fault = state_->session.open_text(contents, file_name);
    if (!fault.empty()) state_->session.say_notice(state_->session.words(fault));
}

void Program::reckoned(std::string_view answer) {
    State& s = *state_;
    s.section.take(answer);
    if (s.session.view.view == View::pair) s.frames_left = std::max(s.frames_left, 1);
}

void Program::restore(std::string_view name, std::string_view text) {
    State& s = *state_;
    if (name == "preferences") s.stored_preferences = s.session.preferences = read_preferences(text);
    if (name != "plan") return;
    ReadPlan read = read_plan(text);
    if (!read.ok()) return;
    s.session.plan = std::move(read.plan);
    s.session.history = History(s.session.plan);
    s.session.refresh();
    s.stored_plan = s.seen_plan = s.session.plan;
}

void Program::press(std::string_view control_id) {
    state_->presses.emplace_back(control_id);
    state_->frames_left = frames_after_input;
}

// ---- the frame ----

void Program::State::fit_typeface(const Screen& screen) {
    const std::vector<double> sizes{screen.small * 0.85, screen.small, screen.text, screen.large, screen.large * 1.5};
    if (sizes == font_sizes && font_ratio == surface.pixel_ratio) return;
    font_sizes = sizes;
    font_ratio = surface.pixel_ratio;
    build_typeface(font, sizes, surface.pixel_ratio);
    font_changed = true;
}

static void notice_ui(Screen& s) {
    Session& session = s.session;
    if (session.notice.empty() || session.now >= session.notice_until) return session.notice.clear();
    const Box whole = s.areas.whole;
    const double width = std::min(whole.width - 24, std::max(160.0, s.width_of(session.notice, s.text) + 40));
    const double height = s.height_of(width - 32, session.notice, s.text) + 20;
    const Box box{whole.x + (whole.width - width) / 2, whole.bottom() - height - 12, width, height};
    s.canvas().box(box, s.colours.ink, 10);
    s.paragraph(box.x + 16, box.y + 10, width - 32, session.notice, {s.text, s.colours.paper});
}

void Program::State::work_on_section() {
    session.section = nullptr;
    session.computing = false;
    if (session.view.view != View::pair || !session.stale.empty()) return;
    std::optional<std::string> order = section.step(session.plan, session.view.field, !grip.field.empty(), session.now);
    if (order) session.requests.push_back({Request::Kind::reckon, "section", std::move(*order)});
    session.section = section.section();
    session.no_section = section.current() ? section.reason() : std::string();
    session.computing = section.computing(session.now);
    // The answers speak of the usual way to turn the antenna, and of the plan as it is now.
    if (session.section && session.section->separation && session.view.field == Polarisation::along &&
        section.least_gaps_hold())
        settle(session.answers, session.plan, *session.section->separation);
}

void Program::State::draw(Screen& screen) {
    const ImVec2 mouse = ImGui::GetIO().MousePos;
    const Point pointer{mouse.x / surface.pixel_ratio, mouse.y / surface.pixel_ratio};
    scrolls.begin_frame();
    screen.presses.swap(presses);
    const std::size_t asked = screen.presses.size();
    const std::vector<Sheet> sheets = session.view.sheets;  // a sheet opened in this frame is drawn from the next
    screen.begin_layer("main", sheets.empty());
    screen.canvas().box({0, 0, surface.width, surface.height}, screen.colours.paper, 0);
    header_ui(screen);
    if (screen.areas.kind == Areas::Kind::desktop) {
        input_column_ui(screen);
        tabs_ui(screen);
        picture_ui(screen, grip, pointer);
        answer_column_ui(screen);
        footer_ui(screen);
    } else {
        strip_ui(screen);
        picture_ui(screen, grip, pointer);
        tabs_ui(screen);
        view_inputs_ui(screen);
    }
    if (sheets.empty()) notice_ui(screen);
    screen.end_layer();
    for (std::size_t i = 0; i < sheets.size(); ++i) {
        const std::string name = "sheet " + std::to_string(i);
        screen.begin_layer(name.c_str(), i + 1 == sheets.size());
        sheet_ui(screen, sheets[i]);
        if (i + 1 == sheets.size()) notice_ui(screen);
        screen.end_layer();
    }
    // An id that nothing on the screen answers to is forgotten, not kept for another screen.
    if (screen.presses.size() == asked && asked > 0) screen.presses.pop_front();
    presses.swap(screen.presses);
    marks = std::move(screen.marks);
}

void Program::State::keep() {
    Session& s = session;
    if (!(s.plan == seen_plan)) seen_plan = s.plan, changed_at = s.now;
    if (!(seen_plan == stored_plan) && s.now - changed_at >= store_after) {
        stored_plan = s.plan;
        s.requests.push_back({Request::Kind::store, "plan", write_plan(s.plan)});
        const Answer* first = s.answers.find(views()[static_cast<std::size_t>(s.view.view)].answers.front());
        if (first && s.stale.empty())
            s.requests.push_back({Request::Kind::announce, "answer",
                                  first->name + ": " + likely_words(*first, s.units()) + ". " + s.words(first->why)});
        if (!s.stale.empty()) s.requests.push_back({Request::Kind::announce, "answer", s.words(s.stale)});
    }
    if (!(s.preferences == stored_preferences)) {
        stored_preferences = s.preferences;
        s.requests.push_back({Request::Kind::store, "preferences", write_preferences(s.preferences)});
    }
}

void Program::frame(double now) {
    State& s = *state_;
    s.enter();
    ImGuiIO& io = ImGui::GetIO();
    const double seconds = std::clamp(now - s.session.now, 1e-4, 0.1);
    s.session.now = std::max(now, s.session.now);
    io.DeltaTime = static_cast<float>(seconds);
    io.DisplaySize = {static_cast<float>(s.surface.width * s.surface.pixel_ratio),
                      static_cast<float>(s.surface.height * s.surface.pixel_ratio)};
    s.finger.tick(s.session.now, s);
    s.moving = s.scrolls.settle(seconds, s.finger.scrolling(), s.surface.reduced_motion);

    Screen screen(s.session, s.surface, s.scrolls, s.dark());
    s.fit_typeface(screen);
    if (s.themed != &screen.colours || s.themed_ratio != s.surface.pixel_ratio) {
        s.themed = &screen.colours;
        s.themed_ratio = s.surface.pixel_ratio;
        apply_theme(screen.colours, s.surface.pixel_ratio);
    }
    const Plan before = s.session.plan;
    const ViewState view_before = s.session.view;
    ImGui::NewFrame();
    act_on_keys(s.session, s.scrolls, s.marks, s.presses);
    s.session.refresh();
    s.work_on_section();
    s.draw(screen);
    ImGui::Render();
    // What a control changed is on the screen with its answers in the next frame.
    if (s.frames_left > 0) --s.frames_left;
    if (!(s.session.plan == before) || !(s.session.view == view_before)) s.frames_left = std::max(s.frames_left, 2);

    const bool down = io.MouseDown[0];
    if (s.was_down && !down) s.session.history.settle(s.session.plan);
    s.was_down = down;
    s.session.history.watch(s.session.plan, s.session.now, down);
    s.keep();
}

bool Program::font_changed() { return std::exchange(state_->font_changed, false); }

double Program::wake_after() const {
    State& s = *state_;
    s.enter();
    const Session& session = s.session;
    const bool fading = s.grip.hint_since >= 0;
    const bool repeating = s.was_down && s.context->ActiveId != 0 && s.grip.field.empty();
    if (s.frames_left > 0 || s.moving || s.context->InputEventsQueue.Size > 0 || !s.presses.empty() || fading ||
        repeating)
        return 0.0;
    double due = std::min(s.finger.due(session.now), session.history.due(session.plan, session.now));
    if (session.view.view == View::pair && session.stale.empty()) due = std::min(due, s.section.due(session.now));
    if (!(s.seen_plan == s.stored_plan)) due = std::min(due, std::max(0.0, s.changed_at + store_after - session.now));
    if (!session.notice.empty()) due = std::min(due, std::max(0.0, session.notice_until - session.now));
    return due;
}

std::vector<Request> Program::take_requests() { return std::exchange(state_->session.requests, {}); }

const Plan& Program::plan() const { return state_->session.plan; }
std::string Program::plan_json() const { return write_plan(state_->session.plan); }
std::string Program::answers_json() const {
    return write_answers(state_->session.plan, state_->session.answers, state_->session.units());
}
std::string Program::controls_json() const { return marks_json(state_->marks); }

}  // namespace gg
