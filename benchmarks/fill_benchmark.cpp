// Matrix fill per kernel evaluation, against the cost of the vectorised exp(-jkR)/R alone in the same run. Aim: half
// the speed of that limit.
#include <annulet/core/constants.hpp>
#include <annulet/mesh/mesh.hpp>
#include <annulet/mom/operator.hpp>

#include <benchmark/benchmark.h>
#include <omp.h>

#include <cmath>
#include <vector>

#include "mom/lane_kernel.hpp"
#include "mom/pair_fill.hpp"

namespace annulet {
namespace {

Mesh ring() {
    Model model;
    model.metals.push_back({"band", 0, false, Ring{{0, 0}, 0.054, 0.008}, {}, {}});
    model.ports.push_back({"feed", Across{{0.05, 0, 0}, {0.058, 0, 0}, 0.00565}, 50, {}, {}});
    MeshOptions options;
    options.top_frequency_hz = 3e9;
    options.refine = 1.5;
    return make_mesh(model, options);
}

void kernel_limit(benchmark::State& state) {
    constexpr int count = 64 * 256;
    std::vector<double> r2(count), re(count), im(count);
    for (int i = 0; i < count; ++i) r2[static_cast<std::size_t>(i)] = 1e-4 + 1e-7 * i;
    for (auto _ : state) {
        kernel_only(r2.data(), count, 20, re.data(), im.data());
        benchmark::DoNotOptimize(re.data());
    }
    const double r = std::sqrt(r2[77]), exact = std::cos(20 * r) / (4 * constants::pi * r);
    if (std::abs(re[77] - exact) > 1e-13 * std::abs(exact)) state.SkipWithError("the kernel is wrong");
    state.counters["ns_per_kernel"] =
        benchmark::Counter(count * 1e-9, benchmark::Counter::kIsIterationInvariantRate | benchmark::Counter::kInvert);
}

void fill(benchmark::State& state) {
    omp_set_num_threads(1);
    const Operator op(ring());
    const double k = 2 * constants::pi * 9e8 / constants::c0_m_per_s;
    double asymmetry = 0;
    for (auto _ : state) {
        const Potentials p = fill_potentials(op.pair_tables(), op.basis(), k, true);
        asymmetry = (p.vector - p.vector.transpose()).norm() / p.vector.norm();
    }
    if (!(asymmetry < 1e-12)) state.SkipWithError("the matrix is not symmetric");
    state.counters["unknowns"] = op.unknowns();
    state.counters["ns_per_kernel"] =
        benchmark::Counter(static_cast<double>(kernel_evaluations(op.pair_tables())) * 1e-9,
                           benchmark::Counter::kIsIterationInvariantRate | benchmark::Counter::kInvert);
}

BENCHMARK(kernel_limit);
BENCHMARK(fill)->Unit(benchmark::kMillisecond);

}  // namespace
}  // namespace annulet

BENCHMARK_MAIN();
