#include "ui/layout.hpp"

#include <algorithm>
#include <cmath>

namespace gg {

/// Header, answers, picture, views, inputs: one under the other.
static void upright(Areas& a, double text) {
    const Box w = a.whole;
    const double tile = std::round(text * 3.4), tabs = a.row;
    a.header = {w.x, w.y, w.width, a.row};
    a.strip = {w.x, a.header.bottom(), w.width, 2 * tile};
    // Half the screen is the picture's; short screens give it up before the rows for input and answers go.
    const double rest = std::max(0.0, w.height - a.header.height - a.strip.height - tabs);
    const double picture = std::clamp(rest - 3.4 * a.row, std::min(rest, 0.4 * w.height), 0.62 * w.height);
    a.picture = {w.x, a.strip.bottom(), w.width, std::min(picture, rest)};
    a.tabs = {w.x, a.picture.bottom(), w.width, tabs};
    a.inputs = {w.x, a.tabs.bottom(), w.width, std::max(0.0, w.bottom() - a.tabs.bottom())};
}

/// A phone on its side: the picture left, everything else right.
static void sideways(Areas& a, double text) {
    const Box w = a.whole;
    const double right = std::clamp(0.42 * w.width, std::min(300.0, w.width), 420.0);
    const double left = w.width - right, tile = std::round(text * 3.4);
    a.picture = {w.x, w.y, left, std::max(0.0, w.height - a.row)};
    a.tabs = {w.x, a.picture.bottom(), left, std::min(a.row, w.height)};
    a.header = {w.x + left, w.y, right, std::min(a.row, w.height)};
    a.strip = {w.x + left, a.header.bottom(), right, std::min(2 * tile, std::max(0.0, w.height - a.row))};
    a.inputs = {w.x + left, a.strip.bottom(), right, std::max(0.0, w.bottom() - a.strip.bottom())};
}

/// A tablet: answers across the top, the picture large, inputs beside it (below it where the screen is tall).
static void tablet(Areas& a, double text) {
    const Box w = a.whole;
    const double tile = std::round(text * 3.8);
    a.header = {w.x, w.y, w.width, 56};
    a.strip = {w.x, a.header.bottom(), w.width, tile};
    const double top = a.strip.bottom(), height = std::max(0.0, w.bottom() - top);
    if (w.width >= 1.15 * w.height) {
        const double right = std::clamp(0.34 * w.width, 320.0, 400.0);
        a.picture = {w.x, top, w.width - right, std::max(0.0, height - a.row - 4)};
        a.tabs = {w.x, a.picture.bottom(), w.width - right, a.row + 4};
        a.inputs = {w.x + w.width - right, top, right, height};
    } else {
        const double below = std::min(0.4 * height, 6 * a.row + 24);
        a.picture = {w.x, top, w.width, std::max(0.0, height - below - a.row - 4)};
        a.tabs = {w.x, a.picture.bottom(), w.width, a.row + 4};
        a.inputs = {w.x, a.tabs.bottom(), w.width, std::max(0.0, w.bottom() - a.tabs.bottom())};
    }
}

/// A desk: inputs, picture, answers side by side, the caution below.
static void desktop(Areas& a, double text) {
    const Box w = a.whole;
    const double side = std::clamp(0.245 * w.width, 300.0, 380.0) * std::min(1.25, text / 15.0),
                 foot = std::round(text * 2.2);
    a.header = {w.x, w.y, w.width, 56};
    a.footer = {w.x, w.bottom() - foot, w.width, foot};
    const double top = a.header.bottom(), height = std::max(0.0, a.footer.y - top);
    a.inputs = {w.x, top, side, height};
    a.answers = {w.right() - side, top, side, height};
    const double middle = std::max(0.0, w.width - 2 * side);
    a.tabs = {w.x + side, top, middle, std::min(52.0, height)};
    a.picture = {w.x + side, a.tabs.bottom(), middle, std::max(0.0, height - a.tabs.height)};
}

Areas areas_for(const Surface& surface, double text) {
    Areas a;
    const auto inset = [](double v) { return v > 0 ? v : 0.0; };
    const double width = surface.width > 0 ? surface.width : 0.0, height = surface.height > 0 ? surface.height : 0.0;
    a.whole = {inset(surface.inset_left), inset(surface.inset_top),
               std::max(0.0, width - inset(surface.inset_left) - inset(surface.inset_right)),
               std::max(0.0, height - inset(surface.inset_top) - inset(surface.inset_bottom))};
    a.row = std::max(48.0, std::round(text * 2.9));
    const double w = a.whole.width / (text / 16.0), h = a.whole.height;
    if (w >= 1080 && h >= 560)
        a.kind = Areas::Kind::desktop;
    else if (w >= 700 && h >= 560)
        a.kind = Areas::Kind::tablet;
    else
        a.kind = w > h && w >= 520 ? Areas::Kind::phone_side : Areas::Kind::phone;
    switch (a.kind) {
        case Areas::Kind::phone:
            upright(a, text);
            break;
        case Areas::Kind::phone_side:
            sideways(a, text);
            break;
        case Areas::Kind::tablet:
            a.margin = 16, tablet(a, text);
            break;
        case Areas::Kind::desktop:
            a.margin = 16;
            a.row = surface.touch ? 48.0 : std::max(40.0, std::round(text * 2.6));
            desktop(a, text);
            break;
    }
    return a;
}

}  // namespace gg
