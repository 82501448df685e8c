// Orders computed on a thread.
#include "app/reckoner.hpp"

#include <doctest/doctest.h>

#include <atomic>

#include "paper/plan_file.hpp"

using namespace gg;
using platform::Reckoner;

namespace {

std::string order_number(std::uint32_t number) {
    Plan plan = read_plan(demos().front().json).plan;
    return write_order({number, PairStep::coarse, Polarisation::along, plan});
}

}  // namespace

TEST_CASE("an order given is answered on the thread, once, and the loop is woken for it") {
    std::atomic<int> woken = 0;
    Reckoner reckoner([&] { ++woken; });
    CHECK(!reckoner.answer());
    reckoner.finish();  // nothing to wait for
    for (std::uint32_t number = 1; number < 4; ++number) {
        reckoner.order(order_number(number));
        reckoner.finish();
        const auto answer = reckoner.answer();
        REQUIRE(answer);
        REQUIRE(read_answer(*answer));
        CHECK(read_answer(*answer)->number == number);
        CHECK(read_answer(*answer)->pair.section.ok());
        CHECK(!reckoner.answer());
    }
    reckoner.order("no order at all");
    reckoner.finish();
    CHECK(reckoner.answer() == "");
    CHECK(woken > 0);
}

TEST_CASE("of orders that wait the last is computed") {
    Reckoner reckoner([] {});
    for (std::uint32_t number = 1; number <= 50; ++number) reckoner.order(order_number(number));
    reckoner.finish();
    const auto answer = reckoner.answer();
    REQUIRE(answer);
    REQUIRE(read_answer(*answer));
    CHECK(read_answer(*answer)->number == 50);
}

TEST_CASE("one that ends with an order waiting or under way ends soundly") {
    for (int i = 0; i < 5; ++i) {
        Reckoner reckoner([] {});
        reckoner.order(order_number(1));
        if (i % 2) reckoner.order(order_number(2));
    }
}
