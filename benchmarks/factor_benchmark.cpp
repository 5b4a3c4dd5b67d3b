// The facade's factorisation of a complex symmetric matrix against Eigen's LU in the same run. Aim: 1.5 times at
// N = 2000.
#include <annulet/numerics/symmetric_solver.hpp>

#include <benchmark/benchmark.h>

#include <random>

namespace annulet {
namespace {

Eigen::MatrixXcd symmetric_matrix(int n) {
    std::mt19937 random(7);
    std::uniform_real_distribution<double> part(-1, 1);
    Eigen::MatrixXcd a(n, n);
    for (int j = 0; j < n; ++j)
        for (int i = 0; i <= j; ++i) a(i, j) = a(j, i) = std::complex<double>(part(random), part(random));
    return a;
}

void factor(benchmark::State& state, FactorBackend backend) {
    const int n = static_cast<int>(state.range(0));
    const Eigen::MatrixXcd a = symmetric_matrix(n), b = Eigen::MatrixXcd::Ones(n, 1);
    double residual = 1;
    for (auto _ : state) {
        const SymmetricSolver solver(a, {backend, 1});
        residual = solver.ok() ? (a * solver.solve(b) - b).norm() / b.norm() : 1;
    }
    if (!(residual < 1e-8)) state.SkipWithError("the solution is wrong");
    state.counters["residual"] = residual;
}

BENCHMARK_CAPTURE(factor, symmetric, FactorBackend::lapack)
    ->Arg(500)
    ->Arg(2000)
    ->UseRealTime()
    ->Unit(benchmark::kMillisecond);
BENCHMARK_CAPTURE(factor, eigen_lu, FactorBackend::eigen)
    ->Arg(500)
    ->Arg(2000)
    ->UseRealTime()
    ->Unit(benchmark::kMillisecond);

}  // namespace
}  // namespace annulet

BENCHMARK_MAIN();
