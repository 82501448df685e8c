#pragma once
/// The canvas that draws into a Dear ImGui draw list: css px in, device px out.
#include "draw/canvas.hpp"

struct ImDrawList;

namespace gg {

class ImGuiCanvas final : public Canvas {
  public:
    /// @param list  valid for the frame under way   @param pixel_ratio  device px per css px, > 0
    ImGuiCanvas(ImDrawList* list, double pixel_ratio) : list_(list), ratio_(pixel_ratio) {}

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

  private:
    ImDrawList* list_;
    double ratio_;
};

/// Triangles (three indices each) of a simple polygon, convex or not, by clipping ears; a polygon that is not simple
/// gives as many as can be cut.
std::vector<int> triangles_of(std::span<const Point> polygon);

}  // namespace gg
