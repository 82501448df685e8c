#include "draw/palette.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <set>

#include "draw/textures.hpp"
#include "pictures.hpp"

using namespace gg;

namespace {

/// Relative luminance and contrast ratio: W3C, Web Content Accessibility Guidelines 2.1 (2018), definitions in its
/// glossary.
double luminance(Colour c) {
    const auto part = [](std::uint8_t byte) {
        const double s = byte / 255.0;
        return s <= 0.03928 ? s / 12.92 : std::pow((s + 0.055) / 1.055, 2.4);
    };
    return 0.2126 * part(c.r) + 0.7152 * part(c.g) + 0.0722 * part(c.b);
}
double contrast(Colour a, Colour b) {
    const double x = luminance(a), y = luminance(b);
    return (std::max(x, y) + 0.05) / (std::min(x, y) + 0.05);
}

}  // namespace

TEST_CASE("the contrast of black on white is 21") {
    CHECK(contrast({0, 0, 0}, {255, 255, 255}) == doctest::Approx(21.0));
}

TEST_CASE("text stands out 7 to 1 and marks 3 to 1, in both themes") {
    for (const bool dark : {false, true}) {
        const Palette& p = palette(dark);
        CHECK(p.dark == dark);
        for (const Colour ground : {p.paper, p.panel}) {
            CHECK(contrast(p.ink, ground) >= 7.0);
            CHECK(contrast(p.soft_ink, ground) >= 7.0);
            for (const Colour mark : {p.wave, p.second, p.warn}) CHECK(contrast(mark, ground) >= 3.0);
        }
        CHECK(contrast(p.wave, p.paper) >= 7.0);  // dimensions are written in it
        CHECK(contrast(p.earth_mark, p.paper) >= 3.0);
        for (const Colour earth : p.earth) {
            CHECK(contrast(p.ink, earth) >= 7.0);
            CHECK(contrast(p.wave, earth) >= 3.0);
        }
    }
}

TEST_CASE("neighbouring layers differ in tint") {
    for (const bool dark : {false, true}) {
        for (int i = 0; i + 1 < 8; ++i) CHECK(!(palette(dark).earth[i] == palette(dark).earth[i + 1]));
    }
}

TEST_CASE("each texture is a drawing of its own, stays within its count and stands still in the ground") {
    std::set<std::string> seen;
    for (int t = 0; t <= static_cast<int>(Texture::grass); ++t) {
        const auto texture = static_cast<Texture>(t);
        const auto drawn = [&](Box box, Point anchor) {
            SvgCanvas canvas(2000, 2000, "texture");
            draw_texture(canvas, box, anchor, texture, {0, 0, 0});
            return canvas.finish();
        };
        const std::string once = drawn({0, 0, 300, 200}, {0, 0});
        CHECK(once == drawn({0, 0, 300, 200}, {0, 0}));
        CHECK_MESSAGE(seen.insert(once).second, t);
        const std::string large = drawn({0, 0, 1900, 1500}, {700, -900});
        std::size_t marks = 0;
        for (const char* tag : {"<polyline", "<polygon", "<circle"}) {
            for (std::size_t at = large.find(tag); at != std::string::npos; at = large.find(tag, at + 1)) ++marks;
        }
        CHECK(marks <= most_texture_marks);
        CHECK((texture == Texture::plain) == (marks == 0));
    }
}

TEST_CASE("the grade signs are filled, half and hollow") {
    const auto sign = [](Grade grade) {
        SvgCanvas canvas(20, 20, "sign");
        grade_sign(canvas, {10, 10}, 6, grade, {0, 0, 0});
        return canvas.finish();
    };
    const std::set<std::string> signs{sign(Grade::none), sign(Grade::good), sign(Grade::thin), sign(Grade::poor)};
    CHECK(signs.size() == 4);
}
