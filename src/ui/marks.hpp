#pragma once
/// What stands on the screen, by name: for tests, for the page's mirror, for screen readers and for the keyboard.
#include <string>
#include <string_view>
#include <vector>

#include "draw/canvas.hpp"

namespace gg {

inline bool operator==(const Box& a, const Box& b) {
    return a.x == b.x && a.y == b.y && a.width == b.width && a.height == b.height;
}
struct Mark {
    std::string id, role, name, value;
    Box box;            ///< css px, cut to what is visible
    bool shown = true;  ///< some of it is visible
    bool operator==(const Mark&) const = default;
};

/// The part of `a` inside `b`; width and height 0 where there is none.
Box meet(Box a, Box b);

/// [{"id","role","name","value","x","y","width","height"}] of those that are shown, in tab order.
std::string marks_json(const std::vector<Mark>& marks);

const Mark* find_mark(const std::vector<Mark>& marks, std::string_view id);

}  // namespace gg
