#include "draw/textures.hpp"

#include <array>
#include <cmath>

namespace gg {
namespace {

/// Two even numbers in [0, 1) for a cell of the ground: always the same ones for the same cell.
Point scatter(int column, int row) {
    auto h = static_cast<std::uint32_t>(column) * 0x9e3779b1u ^ static_cast<std::uint32_t>(row) * 0x85ebca77u;
    h = (h ^ h >> 15) * 0x2c1b3c6du;
    h = (h ^ h >> 12) * 0x297a2d39u;
    h ^= h >> 15;
    return {(h & 0xffffu) / 65536.0, (h >> 16) / 65536.0};
}

struct Pen {
    Canvas& canvas;
    Colour colour;
    double pitch;

    void stroke(std::initializer_list<Point> points, bool closed = false) const {
        canvas.line({points.begin(), points.size()}, {colour, 1.1}, closed);
    }
};

void mark(const Pen& pen, Texture texture, Point p, Point random, int column, int row) {
    const double u = pen.pitch;
    const Point at{p.x + (0.15 + 0.7 * random.x) * u, p.y + (0.15 + 0.7 * random.y) * u};
    switch (texture) {
        case Texture::dots:
            pen.canvas.disc(at, u * (0.05 + 0.035 * random.x), pen.colour);
            break;
        case Texture::coarse_dots: {
            const double r = u * (0.08 + 0.13 * random.y);
            pen.canvas.ring(at, r, {pen.colour, 1.1});
            break;
        }
        case Texture::dashes: {
            const double y = p.y + u * (0.5 + 0.1 * (random.y - 0.5)), x = p.x + (row % 2 == 0 ? 0.0 : 0.5 * u);
            pen.stroke({{x, y}, {x + u * (0.35 + 0.25 * random.x), y}});
            break;
        }
        case Texture::triangles: {
            const double r = u * (0.11 + 0.12 * random.x), turn = 6.2832 * random.y;
            std::array<Point, 3> corner;
            for (std::size_t i = 0; i < 3; ++i) {
                const double a = turn + 2.0944 * static_cast<double>(i);
                corner[i] = {at.x + r * std::cos(a), at.y + r * std::sin(a)};
            }
            pen.canvas.line(corner, {pen.colour, 1.1}, true);
            break;
        }
        case Texture::blocks: {
            const double x = p.x + (row % 2 == 0 ? 0.0 : 0.5 * u);
            pen.stroke({{x + u, p.y}, {x, p.y}, {x, p.y + u}});
            break;
        }
        case Texture::waves: {
            const double x = p.x + (row % 2 == 0 ? 0.0 : 0.5 * u), y = p.y + 0.5 * u, a = 0.09 * u, w = 0.14 * u;
            pen.stroke({{x, y}, {x + w, y - a}, {x + 2 * w, y}, {x + 3 * w, y + a}, {x + 4 * w, y}});
            break;
        }
        case Texture::crosses: {
            if ((column + row) % 2 != 0) break;
            const double a = 0.16 * u;
            const Point c{p.x + 0.5 * u, p.y + 0.5 * u};
            pen.stroke({{c.x - a, c.y}, {c.x + a, c.y}});
            pen.stroke({{c.x, c.y - a}, {c.x, c.y + a}});
            break;
        }
        case Texture::flakes: {
            if (random.x < 0.35) break;
            const double a = 0.13 * u;
            for (int i = 0; i < 3; ++i) {
                const double t = 1.0472 * i + random.y, dx = a * std::cos(t), dy = a * std::sin(t);
                pen.stroke({{at.x - dx, at.y - dy}, {at.x + dx, at.y + dy}});
            }
            break;
        }
        case Texture::grass: {
            const double a = 0.2 * u;
            pen.stroke({{at.x - 0.6 * a, at.y - a}, {at.x, at.y}, {at.x + 0.3 * a, at.y - 1.3 * a}});
            break;
        }
        case Texture::plain:
            break;
    }
}

/// Primitives that a cell costs at most.
int cost(Texture texture) { return texture == Texture::flakes ? 3 : texture == Texture::crosses ? 2 : 1; }

double cell_size(Box box, Texture texture) {
    const int most = most_texture_marks / cost(texture);
    double u = texture == Texture::dots ? 12.0 : 17.0;
    // Whole cells, and one beyond each edge: that many are walked.
    while (u < 1e5 && (box.width / u + 3) * (box.height / u + 2) > most) u *= 1.3;
    return u;
}

}  // namespace

void draw_texture(Canvas& canvas, Box box, Point anchor, Texture texture, Colour marks) {
    if (texture == Texture::plain || !(box.width > 0 && box.height > 0)) return;
    const double u = cell_size(box, texture);
    const double first_column = std::floor((box.x - anchor.x) / u) - 1, first_row = std::floor((box.y - anchor.y) / u);
    if (!(std::abs(first_column) < 1e6 && std::abs(first_row) < 1e6)) return;
    const Pen pen{canvas, marks, u};
    canvas.push_clip(box);
    for (double row = first_row; anchor.y + row * u < box.bottom(); ++row) {
        for (double column = first_column; anchor.x + column * u < box.right(); ++column) {
            const int i = static_cast<int>(column), j = static_cast<int>(row);
            mark(pen, texture, {anchor.x + column * u, anchor.y + row * u}, scatter(i, j), i, j);
        }
    }
    canvas.pop_clip();
}

}  // namespace gg
