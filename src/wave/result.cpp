#include "wave/result.hpp"

namespace gg {

std::string_view sentence(Issue issue) {
    switch (issue) {
        case Issue::none:
            return "";
        case Issue::not_a_number:
            return "An input is not a number.";
        case Issue::out_of_range:
            return "An input is outside its range; the nearest value that makes sense was used.";
        case Issue::outside_band:
            return "Outside the range the source vouches for: an extrapolation.";
        case Issue::model_fails:
            return "The material's model gives no physical answer here; a stand-in was used.";
        case Issue::no_solution:
            return "There is no such thing within the range searched.";
    }
    return "";
}

Issue worse(Issue a, Issue b) {
    const auto rank = [](Issue issue) {
        switch (issue) {
            case Issue::none:
                return 0;
            case Issue::outside_band:
                return 1;
            case Issue::model_fails:
                return 2;
            case Issue::out_of_range:
                return 3;
            case Issue::no_solution:
                return 4;
            case Issue::not_a_number:
                return 5;
        }
        return 5;
    };
    return rank(a) >= rank(b) ? a : b;
}

}  // namespace gg
