#include "ui/imgui_canvas.hpp"

#include <imgui.h>
#include <imgui_internal.h>

#include <algorithm>
#include <cmath>

#include "ui/typeface.hpp"

namespace gg {

static ImU32 packed(Colour c) { return IM_COL32(c.r, c.g, c.b, c.a); }

/// A point that cannot reach the vertex buffer as NaN or as a coordinate beyond what a float keeps to a pixel.
static ImVec2 device(Point p, double ratio) {
    const auto safe = [ratio](double v) {
        return std::isfinite(v) ? static_cast<float>(std::clamp(v * ratio, -1e6, 1e6)) : 0.0f;
    };
    return {safe(p.x), safe(p.y)};
}

/// Points in device px, those closer than half a pixel to the one before left out: dense zig-zags would mitre into
/// spikes.
static std::vector<ImVec2> thinned(std::span<const Point> points, double ratio) {
    std::vector<ImVec2> out;
    out.reserve(points.size());
    for (Point p : points) {
        const ImVec2 d = device(p, ratio);
        if (out.empty() || std::abs(d.x - out.back().x) + std::abs(d.y - out.back().y) >= 0.5f) out.push_back(d);
    }
    return out;
}

/// The drawn stretches of a dashed line.
static void dashed(ImDrawList& list, const std::vector<ImVec2>& points, ImU32 colour, float width, double dash,
                   double space) {
    double into = 0.0;  // px into the dash-and-space pattern
    std::vector<ImVec2> stretch;
    const auto flush = [&] {
        if (stretch.size() > 1) list.AddPolyline(stretch.data(), static_cast<int>(stretch.size()), colour, 0, width);
        stretch.clear();
    };
    for (std::size_t i = 0; i + 1 < points.size(); ++i) {
        const ImVec2 a = points[i], b = points[i + 1];
        const double length = std::hypot(b.x - a.x, b.y - a.y);
        if (!(length > 0)) continue;
        const auto at = [&](double s) {
            const float t = static_cast<float>(s / length);
            return ImVec2(a.x + (b.x - a.x) * t, a.y + (b.y - a.y) * t);
        };
        for (double s = 0.0; s < length;) {
            const bool drawn = into < dash;
            const double run = std::min(length - s, (drawn ? dash : dash + space) - into);
            if (drawn) {
                if (stretch.empty()) stretch.push_back(at(s));
                stretch.push_back(at(s + run));
            }
            s += run;
            into += run;
            if (into >= dash - 1e-9 && drawn) flush();
            if (into >= dash + space - 1e-9) into = 0.0;
            if (!(run > 1e-9)) s += 1e-3;
        }
    }
    flush();
}

void ImGuiCanvas::line(std::span<const Point> points, Stroke stroke, bool closed) {
    std::vector<ImVec2> d = thinned(points, ratio_);
    if (d.size() < 2 || stroke.colour.a == 0) return;
    const float width = static_cast<float>(std::max(1.0, stroke.width * ratio_));
    if (stroke.dash > 0 && stroke.space > 0) {
        if (closed) d.push_back(d.front());
        dashed(*list_, d, packed(stroke.colour), width, std::max(1.0, stroke.dash * ratio_),
               std::max(1.0, stroke.space * ratio_));
        return;
    }
    // A straight hairline looks even only when it covers whole device pixels.
    if (d.size() == 2 && width < 2.5f && (d[0].x == d[1].x || d[0].y == d[1].y)) {
        const float w = std::round(width), half = w * 0.5f;
        ImVec2 low(std::min(d[0].x, d[1].x), std::min(d[0].y, d[1].y)),
            high(std::max(d[0].x, d[1].x), std::max(d[0].y, d[1].y));
        if (d[0].y == d[1].y)
            low.y = std::round(low.y - half), high.y = low.y + w;
        else
            low.x = std::round(low.x - half), high.x = low.x + w;
        list_->AddRectFilled(low, high, packed(stroke.colour));
        return;
    }
    list_->AddPolyline(d.data(), static_cast<int>(d.size()), packed(stroke.colour), closed ? ImDrawFlags_Closed : 0,
                       width);
}

std::vector<int> triangles_of(std::span<const Point> polygon) {
    std::vector<int> rest(polygon.size()), out;
    double twice_area = 0.0;
    for (std::size_t i = 0; i < polygon.size(); ++i) {
        const Point a = polygon[i], b = polygon[(i + 1) % polygon.size()];
        twice_area += a.x * b.y - b.x * a.y;
        rest[i] = static_cast<int>(i);
    }
    if (polygon.size() < 3 || !std::isfinite(twice_area)) return out;
    const double sign = twice_area < 0 ? -1.0 : 1.0;
    const auto turn = [&](int a, int b, int c) {
        const Point p = polygon[a], q = polygon[b], r = polygon[c];
        return sign * ((q.x - p.x) * (r.y - p.y) - (q.y - p.y) * (r.x - p.x));
    };
    while (rest.size() > 2) {
        bool cut = false;
        for (std::size_t i = 0; i < rest.size() && !cut; ++i) {
            const int a = rest[(i + rest.size() - 1) % rest.size()], b = rest[i], c = rest[(i + 1) % rest.size()];
            const double bend = turn(a, b, c);
            if (bend < 0) continue;
            bool ear = true;
            for (int other : rest) {
                if (other == a || other == b || other == c || bend == 0) continue;
                if (turn(a, b, other) > 0 && turn(b, c, other) > 0 && turn(c, a, other) > 0) {
                    ear = false;
                    break;
                }
            }
            if (!ear) continue;
            if (bend > 0) out.insert(out.end(), {a, b, c});
            rest.erase(rest.begin() + static_cast<std::ptrdiff_t>(i));
            cut = true;
        }
        if (!cut) break;
    }
    return out;
}

void ImGuiCanvas::area(std::span<const Point> points, Colour fill) {
    if (points.size() < 3 || fill.a == 0) return;
    std::vector<ImVec2> d;
    d.reserve(points.size());
    for (Point p : points) d.push_back(device(p, ratio_));
    bool left = false, right = false;
    for (std::size_t i = 0; i < d.size(); ++i) {
        const ImVec2 a = d[i], b = d[(i + 1) % d.size()], c = d[(i + 2) % d.size()];
        const float turn = (b.x - a.x) * (c.y - b.y) - (b.y - a.y) * (c.x - b.x);
        left |= turn < 0;
        right |= turn > 0;
    }
    if (!(left && right)) {
        if (left)
            std::reverse(d.begin(), d.end());  // the anti-aliased rim is on the outside of a clockwise outline only
        list_->AddConvexPolyFilled(d.data(), static_cast<int>(d.size()), packed(fill));
        return;
    }
    const std::vector<int> triangles = triangles_of(points);
    if (triangles.empty()) return;
    list_->PrimReserve(static_cast<int>(triangles.size()), static_cast<int>(d.size()));
    const ImDrawIdx first = list_->_VtxCurrentIdx;
    const ImVec2 white = list_->_Data->TexUvWhitePixel;
    for (int index : triangles) list_->PrimWriteIdx(first + static_cast<ImDrawIdx>(index));
    for (const ImVec2& v : d) list_->PrimWriteVtx(v, white, packed(fill));
    if (fill.a == 255) list_->AddPolyline(d.data(), static_cast<int>(d.size()), packed(fill), ImDrawFlags_Closed, 1.0f);
}

void ImGuiCanvas::box(Box box, Colour fill, double radius) {
    if (!(box.width > 0 && box.height > 0) || fill.a == 0) return;
    const ImVec2 a = device({box.x, box.y}, ratio_), b = device({box.right(), box.bottom()}, ratio_);
    list_->AddRectFilled({std::round(a.x), std::round(a.y)}, {std::round(b.x), std::round(b.y)}, packed(fill),
                         static_cast<float>(radius * ratio_));
}

void ImGuiCanvas::disc(Point centre, double radius, Colour fill) {
    if (radius > 0)
        list_->AddCircleFilled(device(centre, ratio_), static_cast<float>(std::min(radius * ratio_, 1e5)),
                               packed(fill));
}

void ImGuiCanvas::ring(Point centre, double radius, Stroke stroke) {
    if (!(radius > 0)) return;
    if (stroke.dash > 0 && stroke.space > 0) {
        std::vector<Point> round;
        for (int i = 0; i < 64; ++i) {
            const double a = 6.283185307179586 * i / 64;
            round.push_back({centre.x + radius * std::cos(a), centre.y + radius * std::sin(a)});
        }
        return line(round, stroke, true);
    }
    list_->AddCircle(device(centre, ratio_), static_cast<float>(std::min(radius * ratio_, 1e5)), packed(stroke.colour),
                     0, static_cast<float>(std::max(1.0, stroke.width * ratio_)));
}

double ImGuiCanvas::measure(std::string_view words, const TextStyle& style) const {
    const double pixels = std::clamp(style.size * box_per_em * ratio_, 1.0, 400.0);
    const ImFont* font = font_for(pixels);
    if (!font || words.empty()) return 0.0;
    const ImVec2 size =
        font->CalcTextSizeA(static_cast<float>(pixels), 1e9f, 0.0f, words.data(), words.data() + words.size());
    return size.x / ratio_ + (style.strong ? 0.4 : 0.0);
}

void ImGuiCanvas::text(Point at, std::string_view words, const TextStyle& style) {
    if (words.empty() || style.colour.a == 0 || !(style.size > 0)) return;
    const double pixels = std::clamp(style.size * box_per_em * ratio_, 1.0, 400.0);
    const ImFont* font = font_for(pixels);
    if (!font) return;
    ImVec2 p = device(at, ratio_);
    const double width = measure(words, style) * ratio_;
    if (style.across == Across::centre) p.x -= static_cast<float>(width / 2);
    if (style.across == Across::right) p.x -= static_cast<float>(width);
    const double ascent = pixels * font->Ascent / font->FontSize;
    if (style.down == Down::middle) p.y -= static_cast<float>(pixels / 2);
    if (style.down == Down::baseline) p.y -= static_cast<float>(ascent);
    if (style.down == Down::bottom) p.y -= static_cast<float>(pixels);
    p = {std::round(p.x), std::round(p.y)};
    const char *first = words.data(), *last = words.data() + words.size();
    list_->AddText(font, static_cast<float>(pixels), p, packed(style.colour), first, last);
    // One weight ships; a second pass a fraction of a pixel aside makes the strong one.
    if (style.strong)
        list_->AddText(font, static_cast<float>(pixels), {p.x + static_cast<float>(0.4 * ratio_), p.y},
                       packed(style.colour), first, last);
}

void ImGuiCanvas::image(Box box, int columns, int rows, std::span<const Colour> pixels) {
    if (columns < 1 || rows < 1 || pixels.size() < static_cast<std::size_t>(columns) * static_cast<std::size_t>(rows))
        return;
    // A mesh of quads with the pixels' colours at its corners: smooth, and it needs no texture of its own. Pixel
    // centres sit half a cell inside; the outermost corners are pulled out to the edge.
    const auto edge = [](int i, int n) { return n < 2 ? static_cast<double>(i) : static_cast<double>(i) / (n - 1); };
    const int across = std::max(columns, 2), down = std::max(rows, 2);
    list_->PrimReserve((across - 1) * (down - 1) * 6, across * down);
    const ImDrawIdx first = list_->_VtxCurrentIdx;
    const ImVec2 white = list_->_Data->TexUvWhitePixel;
    for (int r = 0; r + 1 < down; ++r)
        for (int c = 0; c + 1 < across; ++c) {
            const ImDrawIdx corner = first + static_cast<ImDrawIdx>(r * across + c);
            for (ImDrawIdx i : {corner, corner + 1, corner + static_cast<ImDrawIdx>(across) + 1, corner,
                                corner + static_cast<ImDrawIdx>(across) + 1, corner + static_cast<ImDrawIdx>(across)})
                list_->PrimWriteIdx(i);
        }
    for (int r = 0; r < down; ++r)
        for (int c = 0; c < across; ++c) {
            const Point at{box.x + box.width * edge(c, across), box.y + box.height * edge(r, down)};
            const std::size_t pixel =
                static_cast<std::size_t>(std::min(r, rows - 1) * columns + std::min(c, columns - 1));
            list_->PrimWriteVtx(device(at, ratio_), white, packed(pixels[pixel]));
        }
}

void ImGuiCanvas::push_clip(Box box) {
    list_->PushClipRect(device({box.x, box.y}, ratio_), device({box.right(), box.bottom()}, ratio_), true);
}

void ImGuiCanvas::pop_clip() { list_->PopClipRect(); }

}  // namespace gg
