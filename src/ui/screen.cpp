#include "ui/screen.hpp"

#include <imgui.h>
#include <imgui_internal.h>

#include <algorithm>
#include <cmath>

namespace gg {

static ImRect device_rect(Box b, double ratio) {
    const auto px = [ratio](double v) {
        return static_cast<float>(std::isfinite(v) ? std::clamp(v * ratio, -1e6, 1e6) : 0.0);
    };
    return {px(b.x), px(b.y), px(b.right()), px(b.bottom())};
}

Screen::Screen(Session& session_, const Surface& surface_, Scrolls& scrolls, bool dark)
    : colours(palette(dark)), session(session_), surface(surface_), scrolls_(scrolls) {
    // On a desk the eye is farther from gloves than from small print: 15 px, elsewhere 16.
    const double scale = session.preferences.text_scale;
    areas = areas_for(surface, 16.0 * scale);
    const bool desk = areas.kind == Areas::Kind::desktop;
    text = (desk ? 15.0 : 16.0) * scale;
    small = (desk ? 13.0 : 14.0) * scale;
    large = (desk ? 20.0 : 20.0) * scale;
    ratio = surface.pixel_ratio;
}

void Screen::begin_layer(const char* name, bool top) {
    topmost = top;
    clips_.assign(1, {0, 0, surface.width, surface.height});
    const ImGuiWindowFlags flags = ImGuiWindowFlags_NoDecoration | ImGuiWindowFlags_NoMove |
                                   ImGuiWindowFlags_NoSavedSettings | ImGuiWindowFlags_NoBackground |
                                   ImGuiWindowFlags_NoBringToFrontOnFocus | ImGuiWindowFlags_NoNav |
                                   ImGuiWindowFlags_NoScrollWithMouse;
    ImGui::SetNextWindowPos({0, 0});
    ImGui::SetNextWindowSize(ImGui::GetIO().DisplaySize);
    ImGui::Begin(name, nullptr, flags);
    ImGui::BringWindowToDisplayFront(ImGui::GetCurrentWindow());
    canvas_ = std::make_unique<ImGuiCanvas>(ImGui::GetWindowDrawList(), ratio);
}

void Screen::end_layer() {
    ImGui::End();
    ++layer;
}

double Screen::width_of(std::string_view words, double size) const { return canvas_->measure(words, {{}, size}); }

/// The longest start of `words` that fits with an ellipsis.
static std::string cut_to(const Canvas& canvas, std::string_view words, double width, const TextStyle& style) {
    std::string out(words);
    while (!out.empty()) {
        do out.pop_back();
        while (!out.empty() && (static_cast<unsigned char>(out.back()) & 0xC0) == 0x80);
        if (!out.empty() && static_cast<unsigned char>(out.back()) >= 0xC0) out.pop_back();
        while (!out.empty() && out.back() == ' ') out.pop_back();
        if (canvas.measure(out + "\u2026", style) <= width) return out + "\u2026";
    }
    return {};
}

void Screen::line(Box box, std::string_view words, Line how) {
    if (!(box.width > 0 && box.height > 0)) return;
    TextStyle style{how.colour.a ? how.colour : colours.ink, how.size > 0 ? how.size : text, how.across, Down::middle,
                    how.strong};
    std::string cut;
    if (const double width = canvas_->measure(words, style); width > box.width) {
        style.size *= std::max(0.86, box.width / width - 0.005);
        if (canvas_->measure(words, style) > box.width) words = cut = cut_to(*canvas_, words, box.width, style);
    }
    const double x = how.across == Across::left    ? box.x
                     : how.across == Across::right ? box.right()
                                                   : box.x + box.width / 2;
    canvas_->text({x, box.y + box.height / 2}, words, style);
}

std::vector<std::string> Screen::lines_of(std::string_view words, double width, double size) const {
    const TextStyle style{{}, size};
    std::vector<std::string> lines;
    std::string line;
    for (std::size_t i = 0; i <= words.size();) {
        const std::size_t end = std::min(words.find_first_of(" \n", i), words.size());
        const std::string word(words.substr(i, end - i));
        const std::string longer = line.empty() ? word : line + " " + word;
        if (line.empty() || canvas_->measure(longer, style) <= width) {
            line = longer;
        } else {
            lines.push_back(line);
            line = word;
        }
        while (canvas_->measure(line, style) > width && line.size() > 1) {  // a word longer than a line
            std::size_t n = line.size();
            do --n;
            while (n > 1 && ((static_cast<unsigned char>(line[n]) & 0xC0) == 0x80 ||
                             canvas_->measure(line.substr(0, n), style) > width));
            lines.push_back(line.substr(0, n));
            line.erase(0, n);
        }
        if (end < words.size() && words[end] == '\n') {
            lines.push_back(line);
            line.clear();
        }
        if (end >= words.size()) break;
        i = end + 1;
    }
    if (!line.empty()) lines.push_back(line);
    return lines;
}

double Screen::height_of(double width, std::string_view words, double size) const {
    if (!(width > 8)) return 0.0;
    return static_cast<double>(lines_of(words, width, size).size()) * std::round(size * 1.4);
}

double Screen::paragraph(double x, double y, double width, std::string_view words, Line how) {
    if (!(width > 8)) return y;
    const TextStyle style{how.colour.a ? how.colour : colours.ink, how.size > 0 ? how.size : text, how.across,
                          Down::middle, how.strong};
    const double step = std::round(style.size * 1.4);
    const double at = how.across == Across::left ? x : how.across == Across::right ? x + width : x + width / 2;
    for (const std::string& line : lines_of(words, width, style.size)) {
        canvas_->text({at, y + step / 2}, line, style);
        y += step;
    }
    return y;
}

void Screen::label(Box box, std::string_view words, Line how) {
    const double size = how.size > 0 ? how.size : text;
    if (width_of(words, size) <= box.width) return line(box, words, how);
    std::vector<std::string> lines = lines_of(words, box.width, size);
    if (lines.size() < 2) return line(box, words, how);
    const double step = std::min(std::round(size * 1.2), box.height / 2);
    std::string rest;
    for (std::size_t i = 1; i < lines.size(); ++i) rest += (i > 1 ? " " : "") + lines[i];
    const double top = box.y + box.height / 2 - step;
    line({box.x, top, box.width, step}, lines[0], how);
    line({box.x, top + step, box.width, step}, rest, how);
}

Hit Screen::control(const std::string& id, const char* role, std::string_view name, std::string_view value, Box box,
                    bool repeats) {
    Hit hit;
    if (!topmost) return hit;
    const Box seen = meet(box, clips_.back());
    const bool shown = seen.width > 0.5 && seen.height > 0.5;
    marks.push_back({id, role, std::string(name), std::string(value), shown ? seen : box, shown});
    if (!presses.empty() && presses.front() == id) {
        presses.pop_front();
        hit.pressed = true;
        session.view.focus = id;
    }
    hit.focused = session.view.focus == id;
    const ImGuiID key = ImGui::GetID(id.c_str());
    const ImRect rect = device_rect(box, ratio);
    if (!ImGui::ItemAdd(rect, key)) return hit;
    const bool tapped =
        ImGui::ButtonBehavior(rect, key, &hit.hovered, &hit.held, repeats ? ImGuiButtonFlags_Repeat : 0);
    if (tapped && std::string_view(role) != "img") session.view.focus = id;
    hit.pressed |= tapped;
    return hit;
}

void Screen::backdrop(Box box, Hit hit, Look look, double radius) {
    const bool lit = hit.hovered || hit.held;
    switch (look) {
        case Look::bare:
            if (lit) canvas_->box(box, hit.held ? colours.wave_soft : colours.panel, radius);
            break;
        case Look::quiet:
            canvas_->box(box, hit.held ? colours.wave_soft : colours.panel, radius);
            break;
        case Look::strong:
            canvas_->box(box, hit.held ? colours.ink : colours.wave, radius);
            break;
        case Look::chosen:
            canvas_->box(box, colours.wave_soft, radius);
            break;
    }
    if (look == Look::quiet && hit.hovered && !hit.held)
        canvas_->box({box.x + 2, box.bottom() - 2, box.width - 4, 2}, colours.wave, 1);
    if (hit.focused && !surface.touch) {
        const Box b{box.x + 1, box.y + 1, box.width - 2, box.height - 2};
        const Point frame[] = {{b.x, b.y}, {b.right(), b.y}, {b.right(), b.bottom()}, {b.x, b.bottom()}};
        canvas_->line(frame, {colours.wave, 1.5}, true);
    }
}

bool Screen::button(const std::string& id, std::string_view words, Box box, Look look, std::string_view name) {
    const Hit hit = control(id, "button", name.empty() ? words : name, {}, box);
    backdrop(box, hit, look);
    const Colour colour = look == Look::strong                        ? colours.paper
                          : look == Look::quiet || look == Look::bare ? colours.wave
                                                                      : colours.ink;
    const double size = words.size() <= 2 ? large : text;  // keys of the keypad
    line({box.x + 8, box.y, box.width - 16, box.height}, words, {size, colour, Across::centre, look == Look::strong});
    return hit.pressed;
}

void Screen::sign(Sign what, Point c, double size, Colour colour) {
    const double h = size / 2;
    const Stroke pen{colour, std::max(2.0, size * 0.12)};
    const auto stroke = [&](std::initializer_list<Point> points) {
        canvas_->line({points.begin(), points.size()}, pen, false);
    };
    const auto arc = [&](double side) {  // three quarters of a turn with an arrow head: undo left, redo right
        std::vector<Point> curve;
        for (int i = 0; i <= 18; ++i) {
            const double a = (-150 + 15.0 * i) * 3.14159265358979 / 180;
            curve.push_back({c.x + side * 0.78 * h * std::cos(a), c.y + 0.1 * h + 0.78 * h * std::sin(a)});
        }
        canvas_->line(curve, pen, false);
        const Point tip = curve.front();
        stroke({{tip.x - side * 0.22 * h, tip.y - 0.62 * h}, tip, {tip.x + side * 0.66 * h, tip.y - 0.12 * h}});
    };
    switch (what) {
        case Sign::menu:
            for (double dy : {-0.6, 0.0, 0.6}) stroke({{c.x - 0.85 * h, c.y + dy * h}, {c.x + 0.85 * h, c.y + dy * h}});
            break;
        case Sign::close:
            stroke({{c.x - 0.7 * h, c.y - 0.7 * h}, {c.x + 0.7 * h, c.y + 0.7 * h}});
            stroke({{c.x - 0.7 * h, c.y + 0.7 * h}, {c.x + 0.7 * h, c.y - 0.7 * h}});
            break;
        case Sign::back:
            stroke({{c.x + 0.35 * h, c.y - 0.75 * h}, {c.x - 0.4 * h, c.y}, {c.x + 0.35 * h, c.y + 0.75 * h}});
            break;
        case Sign::more:
            stroke({{c.x - 0.35 * h, c.y - 0.7 * h}, {c.x + 0.35 * h, c.y}, {c.x - 0.35 * h, c.y + 0.7 * h}});
            break;
        case Sign::plus:
            stroke({{c.x, c.y - 0.75 * h}, {c.x, c.y + 0.75 * h}});
            [[fallthrough]];
        case Sign::minus:
            stroke({{c.x - 0.75 * h, c.y}, {c.x + 0.75 * h, c.y}});
            break;
        case Sign::erase:
            stroke({{c.x - h, c.y},
                    {c.x - 0.4 * h, c.y - 0.65 * h},
                    {c.x + h, c.y - 0.65 * h},
                    {c.x + h, c.y + 0.65 * h},
                    {c.x - 0.4 * h, c.y + 0.65 * h},
                    {c.x - h, c.y}});
            stroke({{c.x - 0.1 * h, c.y - 0.25 * h}, {c.x + 0.45 * h, c.y + 0.25 * h}});
            stroke({{c.x - 0.1 * h, c.y + 0.25 * h}, {c.x + 0.45 * h, c.y - 0.25 * h}});
            break;
        case Sign::undo:
            arc(1.0);
            break;
        case Sign::redo:
            arc(-1.0);
            break;
    }
}

bool Screen::sign_button(const std::string& id, Sign what, std::string_view name, Box box, Look look, bool repeats) {
    const Hit hit = control(id, "button", name, {}, box, repeats);
    backdrop(box, hit, look);
    sign(what, {box.x + box.width / 2, box.y + box.height / 2}, std::min(18.0 * text / 16, 0.5 * box.height),
         look == Look::strong  ? colours.paper
         : look == Look::quiet ? colours.wave
                               : colours.ink);
    return hit.pressed;
}

void Screen::hairline(double x, double y, double width) { canvas_->box({x, y, width, 1.0}, colours.hairline, 0.0); }

double Screen::begin_scroll(const std::string& id, Box box, bool across, double page) {
    Scroll& scroll = scrolls_[id];
    scroll.box = box;
    scroll.across = across;
    scroll.page = page;
    scroll.layer = layer;
    scroll.seen = topmost;
    clips_.push_back(meet(box, clips_.back()));
    const ImRect rect = device_rect(clips_.back(), ratio);
    ImGui::PushClipRect(rect.Min, rect.Max, true);
    regions_.push_back(id);
    return (across ? box.x : box.y) - scroll.at;
}

void Screen::end_scroll(double end) {
    Scroll& scroll = scrolls_[regions_.back()];
    const std::string id = regions_.back();
    regions_.pop_back();
    ImGui::PopClipRect();
    clips_.pop_back();
    const Box box = scroll.box;
    const double length = scroll.across ? box.width : box.height;
    scroll.most = std::max(0.0, end + scroll.at - (scroll.across ? box.x : box.y) - length);
    if (!(scroll.most > 0.5)) scroll.most = 0.0;
    // What a finger or a wheel does, for those who have neither.
    const auto turn = [&](const char* way, const char* name, double by) {
        const std::string act = "scroll." + id + way;
        if (!topmost) return;
        marks.push_back({act, "button", name, {}, {box.right() - 1, box.bottom() - 1, 1, 1}, true});
        if (presses.empty() || presses.front() != act) return;
        presses.pop_front();
        scroll.at += by * length;
    };
    if (scroll.at < scroll.most) turn(".on", "Show more", scroll.page > 0 ? 1.0 : 0.8);
    if (scroll.at > 0) turn(".back", "Show what was before", scroll.page > 0 ? -1.0 : -0.8);
    scroll.at = std::clamp(scroll.at, 0.0, scroll.most);
    if (scroll.across || scroll.most <= 0) return;
    const double thumb = std::max(24.0, length * length / (length + scroll.most));
    canvas_->box({box.right() - 5, box.y + (length - thumb) * scroll.at / scroll.most, 3, thumb},
                 colours.soft_ink.with_alpha(0.55), 1.5);
}

}  // namespace gg
