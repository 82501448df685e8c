#pragma once
/// Computes what the program orders on a thread of its own.
#include <condition_variable>
#include <functional>
#include <mutex>
#include <optional>
#include <string>
#include <thread>

#include "paper/pair_desk.hpp"

namespace gg::platform {

class Reckoner {
  public:
    /// @param wake  called on the thread, when an answer is there
    explicit Reckoner(std::function<void()> wake);
    Reckoner(const Reckoner&) = delete;
    Reckoner& operator=(const Reckoner&) = delete;
    /// Waits for the order under way.
    ~Reckoner();
    /// Takes the place of an order that has not been begun.
    void order(std::string text);
    /// An answer, once.
    std::optional<std::string> answer();
    /// Waits until no order is under way or waiting.
    void finish();

  private:
    void work();
    PairDesk desk_;
    std::function<void()> wake_;
    std::mutex mutex_;
    std::condition_variable changed_;
    std::optional<std::string> order_, answer_;
    bool busy_ = false, closing_ = false;
    std::thread thread_;  // the last: it uses all of the above
};

}  // namespace gg::platform
