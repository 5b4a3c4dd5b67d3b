#include <annulet/core/constants.hpp>
#include <annulet/mom/permittivity.hpp>

#include <algorithm>
#include <cmath>

namespace annulet {

namespace {

using Complex = std::complex<double>;

constexpr double w1 = 2 * constants::pi * 1e4;
constexpr double w2 = 2 * constants::pi * 1e12;

Complex logarithm(Complex s) {
    return std::log((w2 + s) / (w1 + s));
}

}  // namespace

Permittivity::Permittivity(const Laminate& laminate) {
    const double normal = laminate.permittivity_z.value_or(0);
    for (const PermittivityPoint& p : laminate.permittivity) {
        const double eps = normal > 0 ? std::sqrt(normal * p.permittivity) : p.permittivity;
        const double w = 2 * constants::pi * p.frequency_hz;
        const Complex l = logarithm(Complex(0, w));
        const double b = -eps * laminate.loss_tangent / l.imag();
        points_.push_back({std::log(w), eps - b * l.real(), b});
    }
    std::sort(points_.begin(), points_.end(), [](const Point& a, const Point& b) { return a.log_w < b.log_w; });
}

Complex Permittivity::operator()(Complex s) const {
    const double log_w = std::log(std::max(std::abs(s), 1e-3));
    Point p = points_.front();
    if (log_w >= points_.back().log_w) p = points_.back();
    for (std::size_t i = 1; i < points_.size(); ++i) {
        const Point &a = points_[i - 1], &b = points_[i];
        if (log_w < a.log_w || log_w >= b.log_w) continue;
        const double x = (log_w - a.log_w) / (b.log_w - a.log_w);
        p = {log_w, (1 - x) * a.eps_inf + x * b.eps_inf, (1 - x) * a.b + x * b.b};
    }
    return p.eps_inf + p.b * logarithm(s);
}

Complex polarisation_factor(const Permittivity& permittivity, Complex s) {
    return 1.0 / (s * constants::eps0_f_per_m * (permittivity(s) - 1.0));
}

}  // namespace annulet
