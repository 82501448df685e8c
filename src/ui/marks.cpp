#include "ui/marks.hpp"

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>

namespace gg {

Box meet(Box a, Box b) {
    const double x = std::max(a.x, b.x), y = std::max(a.y, b.y);
    return {x, y, std::max(0.0, std::min(a.right(), b.right()) - x),
            std::max(0.0, std::min(a.bottom(), b.bottom()) - y)};
}

std::string marks_json(const std::vector<Mark>& marks) {
    const auto tidy = [](double v) { return std::round(v * 10.0) / 10.0; };
    nlohmann::ordered_json list = nlohmann::ordered_json::array();
    for (const Mark& mark : marks) {
        if (!mark.shown) continue;
        list.push_back({{"id", mark.id},
                        {"role", mark.role},
                        {"name", mark.name},
                        {"value", mark.value},
                        {"x", tidy(mark.box.x)},
                        {"y", tidy(mark.box.y)},
                        {"width", tidy(mark.box.width)},
                        {"height", tidy(mark.box.height)}});
    }
    return list.dump(-1, ' ', false, nlohmann::ordered_json::error_handler_t::replace);
}

const Mark* find_mark(const std::vector<Mark>& marks, std::string_view id) {
    const auto found = std::find_if(marks.begin(), marks.end(), [&](const Mark& mark) { return mark.id == id; });
    return found == marks.end() ? nullptr : &*found;
}

}  // namespace gg
