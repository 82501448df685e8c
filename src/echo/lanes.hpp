#pragma once
/// Four floats at a time, on every machine the engine runs on: where a sum needs 1e-5 and no more.
#include <cstring>

namespace gg {

using Four [[gnu::vector_size(16)]] = float;

inline Four load(const float* from) {
    Four value;
    std::memcpy(&value, from, sizeof value);
    return value;
}
inline void store(float* to, Four value) { std::memcpy(to, &value, sizeof value); }

}  // namespace gg
