/// The desktop window: GLFW brings a surface, input and the clipboard, OpenGL 3 draws what the program made. A frame is
/// drawn when something happened or the program asked for one; otherwise the loop sleeps in the system.
#include <GLFW/glfw3.h>
#include <imgui.h>
#include <imgui_impl_opengl3.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <cstdlib>
#include <iostream>
#include <memory>

#include "app/desktop_files.hpp"
#include "app/platform.hpp"
#include "app/reckoner.hpp"
#include "app/window_input.hpp"
#include "wave/embedded.hpp"

namespace gg::platform {

namespace {

constexpr const char* name = "Groundgrain";
constexpr std::array<const char*, 2> kept_texts{"plan", "preferences"};

int complain(const std::string& sentence) {
    std::cerr << "groundgrain: " << sentence << "\n";
    return 2;
}

/// A desktop says that it is dark by the name of its theme, where it says so at all.
bool desktop_is_dark() {
    const char* theme = std::getenv("GTK_THEME");
    return theme && std::string_view(theme).find("dark") != std::string_view::npos;
}

class Window {
  public:
    explicit Window(const Options& options) : options_(options) {}
    Window(const Window&) = delete;
    Window& operator=(const Window&) = delete;

    ~Window() {
        if (drawing_) ImGui_ImplOpenGL3_Shutdown();
        program_.reset();
        for (GLFWcursor* cursor : cursors_)
            if (cursor) glfwDestroyCursor(cursor);
        if (window_) glfwDestroyWindow(window_);
        reckoner_.reset();  // may take a moment: nobody looks at a window that is gone
        glfwTerminate();
    }

    int run() {
        Script script;
        if (!options_.script_file.empty()) {
            const auto text = read_file(options_.script_file);
            if (!text) return complain("Cannot read " + options_.script_file + ".");
            script = read_script(*text);
            if (!script.fault.empty()) return complain(script.fault);
        }
        std::optional<std::string> plan;
        if (!options_.plan_file.empty()) {
            plan = read_file(options_.plan_file);
            if (!plan) return complain("Cannot read " + options_.plan_file + ", or it is no plan file.");
        }
        if (const std::string wrong = open(); !wrong.empty()) return complain(wrong);
        remember();
        if (plan) program_->opened(Path(options_.plan_file).filename().string(), *plan);

        playing_ = !options_.script_file.empty() || !options_.shot_file.empty();
        settle();
        for (const Script::Act& act : script.acts) {
            play(act, pointer_, *program_);
            if (act.kind == Script::Act::Kind::wait) settle();
        }
        if (!options_.shot_file.empty()) {
            settle();
            return shoot() ? 0 : complain("Cannot write " + options_.shot_file + ".");
        }
        if (playing_) ahead_ -= glfwGetTime();
        playing_ = false;
        while (!glfwWindowShouldClose(window_)) turn();
        settle();  // what was still to be kept is kept
        return 0;
    }

  private:
    /// Opens the window; a sentence when that cannot be.
    std::string open() {
        if (!glfwInit())
            return "There is no display to open a window on; groundgrain --help lists what works without one.";
        glfwWindowHint(GLFW_CONTEXT_VERSION_MAJOR, 3);
        glfwWindowHint(GLFW_CONTEXT_VERSION_MINOR, 2);
        glfwWindowHint(GLFW_OPENGL_PROFILE, GLFW_OPENGL_CORE_PROFILE);
        glfwWindowHint(GLFW_OPENGL_FORWARD_COMPAT, GLFW_TRUE);
        glfwWindowHint(GLFW_SCALE_TO_MONITOR, options_.scale > 0 ? GLFW_FALSE : GLFW_TRUE);
        glfwWindowHintString(GLFW_X11_CLASS_NAME, "groundgrain");
        glfwWindowHintString(GLFW_X11_INSTANCE_NAME, "groundgrain");
        const double scale = options_.scale > 0 ? options_.scale : 1.0;
        window_ = glfwCreateWindow(static_cast<int>(options_.width * scale), static_cast<int>(options_.height * scale),
                                   name, nullptr, nullptr);
        if (!window_) return "The window cannot be opened: it needs OpenGL 3.2 or later.";
        glfwMakeContextCurrent(window_);
        glfwSwapInterval(1);
        glfwSetWindowSizeLimits(window_, 240, 240, GLFW_DONT_CARE, GLFW_DONT_CARE);
        program_ = std::make_unique<Program>(font());
        reckoner_ = std::make_unique<Reckoner>(glfwPostEmptyEvent);
        drawing_ = ImGui_ImplOpenGL3_Init("#version 150");
        if (!drawing_) return "The window cannot be opened: it needs OpenGL 3.2 or later.";
        cursors_ = {glfwCreateStandardCursor(GLFW_ARROW_CURSOR), glfwCreateStandardCursor(GLFW_IBEAM_CURSOR),
                    glfwCreateStandardCursor(GLFW_HAND_CURSOR), glfwCreateStandardCursor(GLFW_HRESIZE_CURSOR),
                    glfwCreateStandardCursor(GLFW_VRESIZE_CURSOR)};
        listen();
        return {};
    }

    static Window& self(GLFWwindow* window) { return *static_cast<Window*>(glfwGetWindowUserPointer(window)); }

    void listen() {
        glfwSetWindowUserPointer(window_, this);
        glfwSetCursorPosCallback(window_, [](GLFWwindow* w, double x, double y) {
            Window& me = self(w);
            me.pointer_ = {x / me.window_pixels(), y / me.window_pixels()};
            me.program_->pointer_move(me.pointer_.x, me.pointer_.y, false);
            me.stirred_ = true;
        });
        glfwSetCursorEnterCallback(window_, [](GLFWwindow* w, int inside) {
            if (!inside) self(w).program_->pointer_leave();
            self(w).stirred_ = true;
        });
        glfwSetMouseButtonCallback(window_, [](GLFWwindow* w, int button, int action, int) {
            Window& me = self(w);
            if (button != GLFW_MOUSE_BUTTON_LEFT) return;
            me.program_->pointer_button(me.pointer_.x, me.pointer_.y, action == GLFW_PRESS, false);
            me.stirred_ = true;
        });
        glfwSetScrollCallback(window_, [](GLFWwindow* w, double dx, double dy) {
            self(w).program_->wheel(dx, dy);
            self(w).stirred_ = true;
        });
        glfwSetKeyCallback(window_, [](GLFWwindow* w, int key, int, int action, int) {
            if (action != GLFW_REPEAT && imgui_key(key)) self(w).program_->key(imgui_key(key), action == GLFW_PRESS);
            self(w).stirred_ = true;
        });
        glfwSetCharCallback(window_, [](GLFWwindow* w, unsigned point) {
            self(w).program_->character(point);
            self(w).stirred_ = true;
        });
        glfwSetDropCallback(window_, [](GLFWwindow* w, int count, const char** paths) {
            if (count > 0) self(w).open_plan(paths[0]);
            self(w).stirred_ = true;
        });
        glfwSetWindowRefreshCallback(window_, [](GLFWwindow* w) { self(w).stirred_ = true; });
        glfwSetFramebufferSizeCallback(window_, [](GLFWwindow* w, int, int) { self(w).frame(); });
        ImGuiIO& io = ImGui::GetIO();
        io.ClipboardUserData = window_;
        io.SetClipboardTextFn = [](void* w, const char* text) {
            glfwSetClipboardString(static_cast<GLFWwindow*>(w), text);
        };
        io.GetClipboardTextFn = [](void* w) { return glfwGetClipboardString(static_cast<GLFWwindow*>(w)); };
    }

    /// Physical pixels to one css px.
    double pixel_ratio() const {
        if (options_.scale > 0) return options_.scale;
        float x = 1.0f, y = 1.0f;
        glfwGetWindowContentScale(window_, &x, &y);
        return x > 0 ? static_cast<double>(x) : 1.0;
    }
    /// The system's own pointer units to one css px: pixels on X11, points where the system scales windows itself.
    double window_pixels() const {
        int units = 1, unused = 0, pixels = 1;
        glfwGetWindowSize(window_, &units, &unused);
        glfwGetFramebufferSize(window_, &pixels, &unused);
        return pixel_ratio() * (pixels > 0 ? static_cast<double>(units) / pixels : 1.0);
    }

    void remember() {
        for (const char* text : kept_texts)
            if (const auto kept = read_file(kept_place(text))) program_->restore(text, *kept);
    }
    static Path kept_place(const std::string& text) { return data_folder() / (text + ".json"); }

    /// One round of the loop: sleeps until something happens or is due, then draws.
    void turn() {
        const double due = program_->wake_after();
        const double wake = dialog_.open() ? std::min(0.1, due) : due;
        if (stirred_ || !(wake > 0))
            glfwPollEvents();
        else if (std::isfinite(wake))
            glfwWaitEventsTimeout(wake);
        else
            glfwWaitEvents();
        if (const auto chosen = dialog_.finished()) take(*chosen);
        if (const auto answer = reckoner_->answer()) {
            program_->reckoned(*answer);
            stirred_ = true;
        }
        if (stirred_ || std::isfinite(due)) frame();
    }

    /// s, never going back. While a script plays, time is as long as its frames: every run is then the same.
    double now() const { return playing_ ? ahead_ : glfwGetTime() + ahead_; }

    /// Frames until nothing moves (for a script: and nothing is computed), without waiting for what is due later; at
    /// most 300, for motion that never rests.
    void settle() {
        for (int i = 0; i < 300; ++i) {
            glfwPollEvents();
            frame();
            if (playing_) reckoner_->finish();
            if (const auto answer = reckoner_->answer()) program_->reckoned(*answer);
            const double wake = program_->wake_after();
            if (!std::isfinite(wake)) return;
            ahead_ += std::max(wake, 1.0 / 60);
        }
    }

    void frame() {
        stirred_ = false;
        int width = 0, height = 0;
        glfwGetFramebufferSize(window_, &width, &height);
        if (width > 0 && height > 0) {
            fit(width, height);
            ImGui_ImplOpenGL3_NewFrame();
            program_->frame(now());
            if (program_->font_changed()) {
                ImGui_ImplOpenGL3_DestroyFontsTexture();
                ImGui_ImplOpenGL3_CreateFontsTexture();
                program_->frame(now());  // the frame just built still names the old texture
            }
            draw(width, height);
            glfwSwapBuffers(window_);
            show_cursor();
        }
        for (const Request& request : program_->take_requests()) answer(request);
        const std::string title = program_->plan().name + " \xe2\x80\x93 " + name;
        if (title != title_) glfwSetWindowTitle(window_, (title_ = title).c_str());
    }

    /// Tells the program of its surface when that has changed: being told is a reason to draw again.
    void fit(int width, int height) {
        const double ratio = pixel_ratio();
        if (width == width_ && height == height_ && ratio == ratio_) return;
        width_ = width, height_ = height, ratio_ = ratio;
        Surface surface;
        surface.pixel_ratio = ratio;
        surface.width = width / ratio;
        surface.height = height / ratio;
        surface.system_dark = options_.dark || desktop_is_dark();
        program_->set_surface(surface);
    }

    static void draw(int width, int height) {
        glViewport(0, 0, width, height);
        glClear(GL_COLOR_BUFFER_BIT);
        ImGui_ImplOpenGL3_RenderDrawData(ImGui::GetDrawData());
    }

    void show_cursor() {
        std::size_t index = 0;
        switch (ImGui::GetMouseCursor()) {
            case ImGuiMouseCursor_TextInput:
                index = 1;
                break;
            case ImGuiMouseCursor_Hand:
                index = 2;
                break;
            case ImGuiMouseCursor_ResizeEW:
                index = 3;
                break;
            case ImGuiMouseCursor_ResizeNS:
                index = 4;
                break;
            default:
                break;
        }
        if (index != cursor_) glfwSetCursor(window_, cursors_[cursor_ = index]);
    }

    void answer(const Request& request) {
        switch (request.kind) {
            case Request::Kind::store:
                if (!write_file(kept_place(request.name), request.text) && !complained_) {
                    complained_ = true;
                    complain("Nothing can be kept in " + data_folder().string() + ".");
                }
                break;
            case Request::Kind::save_file:
                saving_ = request.text;
                if (!dialog_.start(Dialog::Kind::save, documents_folder() / request.name))
                    save(free_place(documents_folder(), request.name));
                break;
            case Request::Kind::open_file:
                saving_.reset();
                if (!dialog_.start(Dialog::Kind::open, documents_folder() / ""))
                    say("Drop a plan file on this window to open it");
                break;
            case Request::Kind::copy:
                glfwSetClipboardString(window_, request.text.c_str());
                break;
            case Request::Kind::reckon:
                reckoner_->order(request.text);
                break;
            case Request::Kind::edit_text:  // asked for by fingers only; the window has a keyboard
            case Request::Kind::announce:
                break;
        }
    }

    void take(const Path& chosen) {
        if (chosen.empty()) return;
        if (saving_)
            save(chosen);
        else
            open_plan(chosen);
        stirred_ = true;
    }
    void save(const Path& place) {
        if (!saving_) return;
        say(write_file(place, *saving_) ? "Saved as " + place.string() : "Could not be saved as " + place.string());
        saving_.reset();
    }
    void open_plan(const Path& place) {
        if (const auto text = read_file(place))
            program_->opened(place.filename().string(), *text);
        else
            say(place.filename().string() + " cannot be read");
    }
    /// In the title, until the plan's name changes: the one place that is the window's own.
    void say(const std::string& words) { glfwSetWindowTitle(window_, (words + " \xe2\x80\x93 " + name).c_str()); }

    bool shoot() {
        int width = 0, height = 0;
        glfwGetFramebufferSize(window_, &width, &height);
        draw(width, height);
        std::vector<unsigned char> pixels(static_cast<std::size_t>(width) * static_cast<std::size_t>(height) * 3);
        glPixelStorei(GL_PACK_ALIGNMENT, 1);
        glReadPixels(0, 0, width, height, GL_RGB, GL_UNSIGNED_BYTE, pixels.data());
        std::string file = "P6\n" + std::to_string(width) + " " + std::to_string(height) + "\n255\n";
        const std::size_t row = static_cast<std::size_t>(width) * 3;
        for (int y = height - 1; y >= 0; --y)
            file.append(reinterpret_cast<const char*>(pixels.data()) + static_cast<std::size_t>(y) * row, row);
        return write_file(options_.shot_file, file);
    }

    Options options_;
    GLFWwindow* window_ = nullptr;
    std::unique_ptr<Program> program_;
    std::unique_ptr<Reckoner> reckoner_;
    bool drawing_ = false, stirred_ = true, complained_ = false, playing_ = false;
    double ahead_ = 0.0;          ///< s that the program's clock is before GLFW's
    int width_ = 0, height_ = 0;  ///< physical pixels, as the program knows them
    double ratio_ = 0.0;
    std::array<GLFWcursor*, 5> cursors_{};
    std::size_t cursor_ = 0;
    Pointer pointer_;
    std::string title_;
    Dialog dialog_;
    std::optional<std::string> saving_;  ///< text that waits for its place; empty while a plan is being opened
};

}  // namespace

int run_window(const Options& options) { return Window(options).run(); }

std::string_view font() { return embedded::font_ttf(); }

}  // namespace gg::platform
