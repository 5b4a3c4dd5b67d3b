// The reduced-basis sweep against an exact solution at every point, on rings of a few hundred unknowns, with the error
// beside the time. Ends with status 1 if a bound is broken.
#include <annulet/core/constants.hpp>
#include <annulet/mesh/mesh.hpp>
#include <annulet/model/drawing.hpp>
#include <annulet/mom/affine.hpp>
#include <annulet/sweep/reduced_basis.hpp>

#include <fmt/format.h>
#include <sys/resource.h>

#include <chrono>
#include <cstdio>
#include <string>
#include <vector>

#include "mom/pair_fill.hpp"

namespace {

using namespace annulet;
using Complex = std::complex<double>;

constexpr double low_hz = 1e8, high_hz = 3e9;

template <typename Work>
double seconds(const Work& work) {
    const auto start = std::chrono::steady_clock::now();
    work();
    return std::chrono::duration<double>(std::chrono::steady_clock::now() - start).count();
}

Mesh ring(int cells_per_wavelength, int cells_across) {
    const std::string text =
        "unit = \"mm\"\n[[metal]]\nname = \"band\"\nplane = \"0 mm\"\n"
        "ring = { center = [0, 0], radius = 54, width = 8 }\nmaterial = \"copper\"\n"
        "thickness = \"35 um\"\n[[port]]\nname = \"feed\"\n"
        "across = [[50, 0], [58, 0]]\ngap = 5.65\n";
    MeshOptions options;
    options.top_frequency_hz = high_hz;
    options.cells_per_wavelength = cells_per_wavelength;
    options.cells_across = cells_across;
    return make_mesh(evaluate(read_drawing(text, "ring"), {}), options);
}

std::vector<double> grid(int points) {
    std::vector<double> f;
    for (int i = 0; i < points; ++i) f.push_back(low_hz + (high_hz - low_hz) * i / (points - 1));
    return f;
}

Complex s11(const SweepPoint& point) {
    const Complex y = 50.0 * point.admittance_s(0, 0);
    return (1.0 - y) / (1.0 + y);
}

bool bound(const char* what, double value, double limit, bool at_least = false) {
    const bool held = at_least ? value >= limit : value <= limit;
    std::printf("  %-58s %12.4g  (bound %g) %s\n", what, value, limit, held ? "" : "BROKEN");
    return held;
}

bool measure(int cells_per_wavelength, int cells_across) {
    const Operator op(ring(cells_per_wavelength, cells_across));
    std::printf("%d unknowns\n", op.unknowns());
    double error = 0, reported = 0;
    int solves = 0;
    const auto sweep = [&](int points, double tolerance) {
        std::vector<SweepPoint> found;
        const double time = seconds([&] {
            const AffineOperator affine(op, high_hz);
            ReducedOptions options;
            options.tolerance = tolerance;
            const ReducedSweep reduced(affine, low_hz, high_hz, options);
            found = reduced.evaluate(grid(points), false);
            reported = reduced.reflection_error();
            solves = reduced.full_solves();
        });
        return std::pair(time, std::move(found));
    };
    bool held = true;
    sweep(1001, 1e-4);
    held &= bound("full solutions for 1e-4", solves, 10);
    const auto [time_1001, reduced] = sweep(1001, 1e-6);
    held &= bound("full solutions for 1e-6", solves, 12);
    const double bound_1e6 = reported;
    const double time_27001 = sweep(27001, 1e-6).first;

    std::vector<double> checked;
    for (int i = 0; i < 1001; i += 25) checked.push_back(grid(1001)[static_cast<std::size_t>(i)]);
    std::vector<SweepPoint> exact;
    const double each = seconds([&] {
                            exact = sweep_every_point(op, checked, {false, 0});
                        }) /
                        static_cast<double>(checked.size());
    for (std::size_t i = 0; i < exact.size(); ++i)
        error = std::max(error, std::abs(s11(exact[i]) - s11(reduced[25 * i])));
    held &= bound("largest error of S11 over its estimate", error / bound_1e6, 1);
    std::printf("  every point: %.4f s each, 1001 points %.1f s; reduced: %.3f s, 27001 points %.3f s; error %.1e\n",
                each, 1001 * each, time_1001, time_27001, error);
    held &= bound("1001 points, times faster than every point", 1001 * each / time_1001, 40, true);
    held &= bound("27001 points over 1001 points, time", time_27001 / time_1001, 1.5);

    const AffineOperator affine(op, high_hz);
    constexpr int repeats = 5;
    const double k = 2 * constants::pi * 1.7e9 / constants::c0_m_per_s;
    const double fill = seconds([&] {
        for (int i = 0; i < repeats; ++i) fill_potentials(op.pair_tables(), op.basis(), k, true);
    });
    const double evaluation = seconds([&] {
        for (int i = 0; i < repeats; ++i) affine.impedance_matrix({0, 2 * constants::pi * 1.7e9});
    });
    held &= bound("affine evaluation over exact fill, time", evaluation / fill, 0.1);
    rusage usage{};
    getrusage(RUSAGE_SELF, &usage);
    const int charges = static_cast<int>(op.basis().divergence.rows());
    std::printf("  peak memory so far %.0f MB; formula for this mesh %.0f MB\n",
                static_cast<double>(usage.ru_maxrss) / 1e3,
                affine_memory(op.unknowns(), charges, affine.fills(), affine.nodes(), 8).peak_bytes / 1e6);
    return held;
}

}  // namespace

int main() {
    bool held = measure(20, 3);
    held &= measure(32, 4);
    return held ? 0 : 1;
}
