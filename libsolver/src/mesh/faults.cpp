#include "mesh/faults.hpp"

#include <algorithm>
#include <cmath>

namespace annulet {

namespace {
double clean(double metres) {
    return std::abs(metres) < 1e-10 ? 0.0 : metres * 1e3;
}
}  // namespace

void MeshFaults::throw_if_any() {
    if (list_.empty()) return;
    std::stable_sort(list_.begin(), list_.end(),
                     [](const Diagnostic& a, const Diagnostic& b) { return a.where < b.where; });
    throw InputError(std::move(list_));
}

std::string mm(double metres) {
    return fmt::format("{:.4g} mm", clean(metres));
}

std::string mm(const Vec2& point) {
    return fmt::format("({:.4g}, {:.4g}) mm", clean(point.x()), clean(point.y()));
}

}  // namespace annulet
