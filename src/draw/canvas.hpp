#pragma once
/// What a picture may do: a few primitives, in css pixels, y down. Two implementations: SVG here, ImGui in ui.
#include <cstdint>
#include <span>
#include <string_view>
#include <vector>

namespace gg {

struct Point {
    double x = 0.0, y = 0.0;
    bool operator==(const Point&) const = default;
};
struct Box {
    double x = 0.0, y = 0.0, width = 0.0, height = 0.0;
    double right() const { return x + width; }
    double bottom() const { return y + height; }
    bool holds(Point p) const { return p.x >= x && p.x <= right() && p.y >= y && p.y <= bottom(); }
};
struct Colour {
    std::uint8_t r = 0, g = 0, b = 0, a = 255;
    bool operator==(const Colour&) const = default;
    Colour with_alpha(double share) const { return {r, g, b, static_cast<std::uint8_t>(255 * share + 0.5)}; }
};
struct Stroke {
    Colour colour;
    double width = 1.0;
    double dash = 0.0, space = 0.0;  ///< css px; 0: unbroken
};
enum class Across : std::uint8_t { left, centre, right };
enum class Down : std::uint8_t { top, middle, baseline, bottom };
struct TextStyle {
    Colour colour;
    double size = 14.0;  ///< css px, em
    Across across = Across::left;
    Down down = Down::baseline;
    bool strong = false;
};

class Canvas {
  public:
    virtual ~Canvas() = default;
    virtual void line(std::span<const Point> points, Stroke stroke, bool closed = false) = 0;
    /// Filled polygon, simple, convex or not.
    virtual void area(std::span<const Point> points, Colour fill) = 0;
    virtual void box(Box box, Colour fill, double radius = 0.0) = 0;
    virtual void disc(Point centre, double radius, Colour fill) = 0;
    virtual void ring(Point centre, double radius, Stroke stroke) = 0;
    virtual void text(Point at, std::string_view words, const TextStyle& style) = 0;
    /// Width of a text in css px.
    virtual double measure(std::string_view words, const TextStyle& style) const = 0;
    /// `rows` x `columns` colours stretched over a box, smoothed.
    virtual void image(Box box, int columns, int rows, std::span<const Colour> pixels) = 0;
    virtual void push_clip(Box box) = 0;
    virtual void pop_clip() = 0;
};

}  // namespace gg
