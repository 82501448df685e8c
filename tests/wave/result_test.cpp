#include "wave/result.hpp"

#include "near.hpp"

using namespace gg;

TEST_CASE("an infinite or undefined number becomes zero with a reason") {
    CHECK(gg::finite(2.5) == Value{2.5, Issue::none});
    CHECK(gg::finite(std::nan("")) == Value{0.0, Issue::not_a_number});
    CHECK(gg::finite(INFINITY).issue == Issue::not_a_number);
    CHECK(gg::finite(2.5, Issue::outside_band).ok());
    CHECK_FALSE(gg::finite(2.5, Issue::model_fails).ok());
}

TEST_CASE("every issue has a sentence of its own, and the graver of two wins whichever comes first") {
    const Issue order[] = {Issue::none,         Issue::outside_band, Issue::model_fails,
                           Issue::out_of_range, Issue::no_solution,  Issue::not_a_number};
    CHECK(sentence(Issue::none).empty());
    for (std::size_t i = 0; i < std::size(order); ++i) {
        for (std::size_t j = 0; j < i; ++j) {
            CHECK(worse(order[i], order[j]) == order[i]);
            CHECK(worse(order[j], order[i]) == order[i]);
            CHECK(sentence(order[i]) != sentence(order[j]));
        }
    }
}
