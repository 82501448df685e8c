#pragma once
/// What all pictures share: labels that never cover each other, grips, ticks, scale bar, arrows.
#include <array>
#include <string>
#include <string_view>
#include <vector>

#include "draw/figure.hpp"

namespace gg {

/// Puts words where nothing else stands; words that fit nowhere are left out, so the important ones go first.
class Labels {
  public:
    Labels(Canvas& canvas, const Palette& colours, Box bounds) : canvas_(canvas), colours_(colours), bounds_(bounds) {}

    /// Writes at the first of the places that is free and inside the bounds. `plate`: a pale ground behind the words.
    bool put(std::initializer_list<Point> places, std::string_view words, const TextStyle& style, bool plate = true);
    /// Keeps a place free of words.
    void keep(Box box) { taken_.push_back(box); }
    void keep_round(Point centre, double radius) {
        keep({centre.x - radius, centre.y - radius, 2 * radius, 2 * radius});
    }

  private:
    bool free(Box box) const;
    Canvas& canvas_;
    const Palette& colours_;
    Box bounds_;
    std::vector<Box> taken_;
};

constexpr double grip_radius = 12.0;  ///< css px

/// A picture being drawn: what each figure reads, draws with and gives back. The figures add what is their own.
struct Sketch {
    Canvas& canvas;
    const Plan& plan;
    const Answers& answers;
    const FigureStyle& style;
    const Palette& colours;
    Labels labels;
    Figure figure;

    Sketch(Canvas& on, const Plan& of, const Answers& with, const FigureStyle& look)
        : canvas(on),
          plan(of),
          answers(with),
          style(look),
          colours(palette(look.dark)),
          labels(on, colours, look.box) {}
    double small() const { return 0.85 * style.text; }
    /// From a grip's centre to words beside it, plate and all.
    double beside_grip() const { return grip_radius + 4 + 0.25 * style.text; }
    std::string length(double metres) const { return say(metres, Quantity::length, style.units); }

    /// Words on one line from `at`, made smaller by up to a quarter where there is too little room for them.
    /// @param reserved  css px kept free at the picture's right edge
    bool put_line(Point at, std::string_view words, TextStyle look, double reserved = 0.0);

    /// The first thing a figure does: paper in its box, and nothing drawn outside.
    void begin();
    /// The last thing: leaves out handles that are not numbers or not in the picture, as a plan that makes no sense may
    /// give, draws the grips of the others when the style wants them, and gives the figure with its description.
    Figure finish(std::string description);
};

/// The sign of a thing that can be dragged: an accent disc with chevrons the way it goes; stronger while held.
void draw_grip(Canvas& canvas, const Palette& colours, const Handle& handle, bool held);
/// A few points in place, for Canvas::line and area.
template <std::size_t N>
std::array<Point, N> points(const Point (&list)[N]) {
    std::array<Point, N> out;
    for (std::size_t i = 0; i < N; ++i) out[i] = list[i];
    return out;
}

/// `p` moved inside `box` by at least `margin` from its edges.
Point inside(Point p, Box box, double margin);

/// Round numbers for an axis from `low` to `high`, at most `most` of them: 1, 2 or 5 times a power of ten.
std::vector<double> ticks(double low, double high, int most);
double nice_step(double least);     ///< smallest of 1, 2, 5 times a power of ten that is not below
double nice_ceiling(double least);  ///< smallest of 1, 1.5, 2, 3, 4, 5, 6, 8 times a power of ten that is not below
double nice_floor(double most);     ///< the largest of them that is not above

/// The one unit of a length axis that shows `extent` m: "m", "mm", "ft" or "in".
struct AxisUnit {
    std::string name;
    double metres = 1.0;
};
AxisUnit length_axis(double extent, UnitSystem units);
/// A tick's number, without its unit: "0.5", "12".
std::string tick_words(double value);

/// Bar of a round length with its words above it, lower left corner at `at`, at most `most` px long.
void draw_scale_bar(Sketch& sketch, Point at, double most, double px_per_metre);
/// A line with short bars across its ends.
void draw_dimension(Canvas& canvas, Point from, Point to, Stroke stroke);
/// Small filled triangle with its tip at `tip`, pointing along `direction` (any length).
void draw_arrowhead(Canvas& canvas, Point tip, Point direction, double size, Colour colour);

/// Likely value of an answer, or `otherwise` where there is none that may be shown.
double answer_or(const Answers& answers, std::string_view key, double otherwise);
/// A round target as it is filled: solid metal, a pipe's wall with water or air in it, a bare void.
void draw_round(Canvas& canvas, const Palette& colours, Point centre, double radius, Filling filling);
/// Name and texture of a layer's material.
std::string material_name(const Matter& matter);
Texture texture_of(const Matter& matter);
/// "110 mm plastic pipe with water".
std::string target_words(const Target& target, UnitSystem units);
/// True when there is room and sense to draw at all.
bool drawable_box(Box box);

}  // namespace gg
