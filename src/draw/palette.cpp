#include "draw/palette.hpp"

#include <array>
#include <cmath>

namespace gg {
namespace {

constexpr Colour hex(unsigned rgb) {
    return {static_cast<std::uint8_t>(rgb >> 16), static_cast<std::uint8_t>(rgb >> 8 & 255),
            static_cast<std::uint8_t>(rgb & 255), 255};
}

// Ink on paper, ground in ochres and warm greys, and one sea blue for the wave: the pair that red-green blind eyes tell
// best. Neighbouring earth tints alternate in lightness, so that two layers never look like one.
const Palette light{false,
                    hex(0xffffff),
                    hex(0xf4f0e8),
                    hex(0xcdc5b6),
                    hex(0x111111),
                    hex(0x474139),
                    hex(0x005a82),
                    hex(0xcfe6f0),
                    hex(0x8f4400),
                    hex(0xb01e17),
                    {hex(0xf3e9d2), hex(0xdfceb0), hex(0xebe1d2), hex(0xd2c2a4), hex(0xe4dbcd), hex(0xcbb896),
                     hex(0xded2bf), hex(0xc4b391)},
                    hex(0x84704c)};

const Palette dark_one{true,
                       hex(0x12110e),
                       hex(0x211f1a),
                       hex(0x4b463c),
                       hex(0xf1ebdf),
                       hex(0xcdc5b6),
                       hex(0x62c9ee),
                       hex(0x143d4d),
                       hex(0xffb36b),
                       hex(0xff8f7e),
                       {hex(0x302a20), hex(0x40372a), hex(0x36302a), hex(0x4a3f2f), hex(0x38332b), hex(0x473d2c),
                        hex(0x3d362c), hex(0x524634)},
                       hex(0xa08c66)};

}  // namespace

const Palette& palette(bool dark) { return dark ? dark_one : light; }

void grade_sign(Canvas& canvas, Point centre, double radius, Grade grade, Colour colour) {
    if (grade == Grade::none) return;
    const double width = std::max(1.5, radius * 0.24);
    canvas.ring(centre, radius - width / 2, {colour, width});
    if (grade == Grade::good) canvas.disc(centre, radius, colour);
    if (grade == Grade::thin) {
        std::array<Point, 17> half;
        for (std::size_t i = 0; i < half.size(); ++i) {
            const double angle = 3.14159265358979 * static_cast<double>(i) / 16.0;  // lower half
            half[i] = {centre.x + radius * std::cos(angle), centre.y + radius * std::sin(angle)};
        }
        canvas.area(half, colour);
    }
}

}  // namespace gg
