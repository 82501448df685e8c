#pragma once
/// The canvas that writes SVG: for the sheet, the command line and tests.
#include <string>

#include "draw/canvas.hpp"

namespace gg {

/// Collects primitives; `finish()` gives a whole SVG document with role="img", <title> and <desc>.
class SvgCanvas final : public Canvas {
  public:
    SvgCanvas(double width, double height, std::string title, std::string description = {});
    /// The description, for a figure that knows its words only once drawn.
    void describe(std::string description) { description_ = std::move(description); }
    void line(std::span<const Point> points, Stroke stroke, bool closed) override;
    void area(std::span<const Point> points, Colour fill) override;
    void box(Box box, Colour fill, double radius) override;
    void disc(Point centre, double radius, Colour fill) override;
    void ring(Point centre, double radius, Stroke stroke) override;
    void text(Point at, std::string_view words, const TextStyle& style) override;
    double measure(std::string_view words, const TextStyle& style) const override;
    void image(Box box, int columns, int rows, std::span<const Colour> pixels) override;
    void push_clip(Box box) override;
    void pop_clip() override;
    std::string finish() const;

  private:
    double width_, height_;
    std::string title_, description_, body_;
    int clips_ = 0;
};

}  // namespace gg
