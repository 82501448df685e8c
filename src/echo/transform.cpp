#include "echo/transform.hpp"

#include <unsupported/Eigen/FFT>

namespace gg {

int fast_length(int n) {
    for (;; ++n) {
        int rest = n;
        for (const int factor : {2, 3, 5}) {
            while (rest % factor == 0) rest /= factor;
        }
        if (rest == 1) return n;
    }
}

struct Transform::Plans {
    using Fft = Eigen::FFT<double>;
    Fft fft{Eigen::default_fft_impl<double>(), static_cast<Fft::Flag>(Fft::Unscaled | Fft::HalfSpectrum)};
};

Transform::Transform() : plans_(std::make_unique<Plans>()) {}
Transform::~Transform() = default;

void Transform::sum(const Complex* in, Complex* out, int n) { plans_->fft.inv(out, in, n); }
void Transform::sum_real(const Complex* half, double* out, int n) { plans_->fft.inv(out, half, n); }
void Transform::split_real(const double* in, Complex* half, int n) { plans_->fft.fwd(half, in, n); }

}  // namespace gg
