#pragma once
/// Fourier transforms that keep their plans: the engine does thousands of a few lengths.
#include <memory>
#include <vector>

#include "wave/constants.hpp"

namespace gg {

/// The next length from n on whose only factors are 2, 3 and 5.
int fast_length(int n);

class Transform {
  public:
    Transform();
    ~Transform();
    Transform(const Transform&) = delete;
    Transform& operator=(const Transform&) = delete;

    /// out_i = sum_k in_k exp(2 pi j i k / n), both of `n`, not in place.
    void sum(const Complex* in, Complex* out, int n);
    /// The same of the n real numbers whose half spectrum (n/2 + 1, n even) is given.
    void sum_real(const Complex* half, double* out, int n);
    /// Half spectrum of n real numbers (n even): out_k = sum_i in_i exp(-2 pi j i k / n).
    void split_real(const double* in, Complex* half, int n);

  private:
    struct Plans;
    std::unique_ptr<Plans> plans_;
};

}  // namespace gg
