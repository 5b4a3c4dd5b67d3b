// Error bars: the same model on meshes of different fineness.
#pragma once

#include <annulet/study/solve.hpp>

namespace annulet {

/// Half-width for the finer of two results `difference` apart on meshes whose cell sizes are `ratio` > 1 apart: the
/// grid convergence index 3 |difference| / (ratio^2 - 1) with the formal order 2 and the factor of safety 3 for two
/// meshes [Roache1994].
double two_mesh_uncertainty(double difference, double ratio);

/// For the finest of three: the observed order p of the two differences, kept within 0.5 and 2, and the factor of
/// safety 1.25 for an order that was observed [Roache1994]; 3 where the differences do not shrink or change their sign.
double three_mesh_uncertainty(double first_difference, double first_ratio, double last_difference, double last_ratio);

struct ConvergeOptions {
    double time_limit_s = 300;  ///< a mesh that would take longer is not begun
    int most_meshes = 5;
};

/// `solve_model` on the mesh asked for and on one finer by half, whose results are given; large meshes are compared
/// with one coarser by a third instead. Sets `uncertainty_hz` of every resonance and the uncertainty of the
/// reflections. Where the model's [accuracy] asks for more, meshes finer by half follow until every resonance is that
/// certain, or a caution says why not. Throws as `solve_model`.
SolvedModel solve_with_error_bars(const Model& model, const SolveOptions& options, const ConvergeOptions& converge = {},
                                  Progress* progress = nullptr);

}  // namespace annulet
