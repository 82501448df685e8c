#include "draw/svg_canvas.hpp"

#include <cmath>
#include <cstdio>

#include "draw/glyph_widths.hpp"
#include "draw/png.hpp"

namespace gg {
namespace {

/// Shortest text with at most two decimals: a hundredth of a css pixel is below what any screen shows.
std::string number(double x) {
    char text[48];
    std::snprintf(text, sizeof text, "%.2f", x);
    std::string out = text;
    out.erase(out.find_last_not_of('0') + 1);
    if (out.back() == '.') out.pop_back();
    return out == "-0" ? "0" : out;
}

/// Within what SVG readers hold as a float, and no NaN.
bool drawable(double x) { return std::abs(x) < 1e6; }
bool drawable(Point p) { return drawable(p.x) && drawable(p.y); }
bool drawable(Box b) {
    return drawable(b.x) && drawable(b.y) && b.width > 0 && b.height > 0 && drawable(b.width) && drawable(b.height);
}

std::string attribute(const char* name, double x) { return std::string(" ") + name + "=\"" + number(x) + "\""; }

std::string paint(const char* name, Colour c) {
    char text[64];
    std::snprintf(text, sizeof text, " %s=\"#%02x%02x%02x\"", name, c.r, c.g, c.b);
    std::string out = text;
    if (c.a != 255) {
        std::snprintf(text, sizeof text, " %s-opacity=\"%.3g\"", name, c.a / 255.0);
        out += text;
    }
    return out;
}

std::string pen(Stroke s) {
    std::string out = " fill=\"none\"" + paint("stroke", s.colour) + attribute("stroke-width", s.width);
    if (s.dash > 0)
        out += " stroke-dasharray=\"" + number(s.dash) + " " + number(s.space > 0 ? s.space : s.dash) + "\"";
    return out;
}

std::string escaped(std::string_view words) {
    std::string out;
    for (const char c : words) {
        switch (c) {
            case '&':
                out += "&amp;";
                break;
            case '<':
                out += "&lt;";
                break;
            case '>':
                out += "&gt;";
                break;
            case '"':
                out += "&quot;";
                break;
            default:
                // XML 1.0 has no place for other control characters.
                if (static_cast<unsigned char>(c) >= 0x20 || c == '\t' || c == '\n') out += c;
        }
    }
    return out;
}

std::string path(std::span<const Point> points) {
    std::string out;
    for (const Point& p : points) {
        if (!drawable(p)) continue;
        if (!out.empty()) out += ' ';
        out += number(p.x) + "," + number(p.y);
    }
    return out;
}

}  // namespace

SvgCanvas::SvgCanvas(double width, double height, std::string title, std::string description)
    : width_(width), height_(height), title_(std::move(title)), description_(std::move(description)) {}

void SvgCanvas::line(std::span<const Point> points, Stroke stroke, bool closed) {
    if (points.size() < 2 || !(stroke.width > 0) || stroke.colour.a == 0) return;
    body_ += std::string(closed ? "<polygon" : "<polyline") + " points=\"" + path(points) + "\"" + pen(stroke) +
             " stroke-linejoin=\"round\" stroke-linecap=\"" + (stroke.dash > 0 ? "butt" : "round") + "\"/>\n";
}

void SvgCanvas::area(std::span<const Point> points, Colour fill) {
    if (points.size() < 3 || fill.a == 0) return;
    body_ += "<polygon points=\"" + path(points) + "\"" + paint("fill", fill) + "/>\n";
}

void SvgCanvas::box(Box b, Colour fill, double radius) {
    if (!drawable(b) || fill.a == 0) return;
    body_ += "<rect" + attribute("x", b.x) + attribute("y", b.y) + attribute("width", b.width) +
             attribute("height", b.height);
    if (radius > 0) body_ += attribute("rx", radius);
    body_ += paint("fill", fill) + "/>\n";
}

void SvgCanvas::disc(Point centre, double radius, Colour fill) {
    if (!drawable(centre) || !(radius > 0) || !drawable(radius) || fill.a == 0) return;
    body_ += "<circle" + attribute("cx", centre.x) + attribute("cy", centre.y) + attribute("r", radius) +
             paint("fill", fill) + "/>\n";
}

void SvgCanvas::ring(Point centre, double radius, Stroke stroke) {
    if (!drawable(centre) || !(radius > 0) || !drawable(radius) || !(stroke.width > 0)) return;
    body_ += "<circle" + attribute("cx", centre.x) + attribute("cy", centre.y) + attribute("r", radius) + pen(stroke) +
             "/>\n";
}

void SvgCanvas::text(Point at, std::string_view words, const TextStyle& style) {
    if (!drawable(at) || words.empty() || !(style.size > 0)) return;
    // Cap height 0.73 em and descent 0.24 em of the typeface; `dominant-baseline` is not everywhere the same.
    const double down = style.down == Down::top      ? 0.93
                        : style.down == Down::middle ? 0.36
                        : style.down == Down::bottom ? -0.24
                                                     : 0.0;
    const char* anchor = style.across == Across::left ? "start" : style.across == Across::centre ? "middle" : "end";
    body_ += "<text" + attribute("x", at.x) + attribute("y", at.y + down * style.size) +
             attribute("font-size", style.size) + " text-anchor=\"" + anchor + "\"" + paint("fill", style.colour) +
             (style.strong ? " font-weight=\"bold\">" : ">") + escaped(words) + "</text>\n";
}

double SvgCanvas::measure(std::string_view words, const TextStyle& style) const {
    const auto& widths = style.strong ? strong_widths : plain_widths;
    double sum = 0.0;
    for (std::size_t i = 0; i < words.size(); ++i) {
        const auto c = static_cast<unsigned char>(words[i]);
        if ((c & 0xc0) == 0x80) continue;  // the rest of a letter already counted
        unsigned code = c;
        if ((c & 0xe0) == 0xc0 && i + 1 < words.size())
            code = (c & 0x1fu) << 6 | (static_cast<unsigned char>(words[i + 1]) & 0x3fu);
        const std::size_t at = code >= 0xa0 ? code - 0xa0 + 95 : code - 0x20;
        sum += code < 0x20 ? 0 : at < widths.size() ? widths[at] : 1229;  // 0.6 em for a letter outside the table
    }
    return sum / 2048.0 * style.size;
}

void SvgCanvas::image(Box b, int columns, int rows, std::span<const Colour> pixels) {
    const std::string address = drawable(b) ? png_address(columns, rows, pixels) : std::string();
    if (address.empty()) return;
    body_ += "<image" + attribute("x", b.x) + attribute("y", b.y) + attribute("width", b.width) +
             attribute("height", b.height) + " preserveAspectRatio=\"none\" href=\"" + address + "\"/>\n";
}

void SvgCanvas::push_clip(Box b) {
    // A nested <svg> clips by itself and needs no id, so that several pictures can stand in one page.
    if (!drawable(b)) b = {0, 0, 1e-3, 1e-3};
    ++clips_;
    body_ += "<svg" + attribute("x", b.x) + attribute("y", b.y) + attribute("width", b.width) +
             attribute("height", b.height) + " viewBox=\"" + number(b.x) + " " + number(b.y) + " " + number(b.width) +
             " " + number(b.height) + "\">\n";
}

void SvgCanvas::pop_clip() {
    if (clips_ == 0) return;
    --clips_;
    body_ += "</svg>\n";
}

std::string SvgCanvas::finish() const {
    const double w = drawable(width_) && width_ > 0 ? width_ : 1, h = drawable(height_) && height_ > 0 ? height_ : 1;
    std::string out = "<svg xmlns=\"http://www.w3.org/2000/svg\" role=\"img\"" + attribute("width", w) +
                      attribute("height", h) + " viewBox=\"0 0 " + number(w) + " " + number(h) +
                      "\" font-family=\"Groundgrain, DejaVu Sans, sans-serif\">\n<title>" + escaped(title_) +
                      "</title>\n<desc>" + escaped(description_) + "</desc>\n" + body_;
    for (int i = 0; i < clips_; ++i) out += "</svg>\n";
    return out + "</svg>\n";
}

}  // namespace gg
