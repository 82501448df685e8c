#include "app/reckoner.hpp"

#include <utility>

namespace gg::platform {

Reckoner::Reckoner(std::function<void()> wake) : wake_(std::move(wake)), thread_([this] { work(); }) {}

Reckoner::~Reckoner() {
    {
        const std::lock_guard lock(mutex_);
        closing_ = true;
    }
    changed_.notify_all();
    thread_.join();
}

void Reckoner::order(std::string text) {
    {
        const std::lock_guard lock(mutex_);
        order_ = std::move(text);
    }
    changed_.notify_all();
}

std::optional<std::string> Reckoner::answer() {
    const std::lock_guard lock(mutex_);
    return std::exchange(answer_, std::nullopt);
}

void Reckoner::finish() {
    std::unique_lock lock(mutex_);
    changed_.wait(lock, [this] { return !order_ && !busy_; });
}

void Reckoner::work() {
    std::unique_lock lock(mutex_);
    for (;;) {
        changed_.wait(lock, [this] { return order_ || closing_; });
        if (closing_) return;
        const std::string text = *std::exchange(order_, std::nullopt);
        busy_ = true;
        lock.unlock();
        std::string answer = desk_.answer(text);
        lock.lock();
        answer_ = std::move(answer);
        busy_ = false;
        changed_.notify_all();
        wake_();
    }
}

}  // namespace gg::platform
