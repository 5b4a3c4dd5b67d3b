#include <annulet/core/diagnostics.hpp>
#include <annulet/mesh/quality.hpp>
#include <annulet/study/solve.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <chrono>
#include <cmath>
#include <utility>

#include "study/swept.hpp"

namespace annulet {
namespace {

constexpr int most_points = 1'000'000;

/// Seconds since the last call.
class StopWatch {
public:
    double lap() {
        const auto now = std::chrono::steady_clock::now();
        return std::chrono::duration<double>(now - std::exchange(last_, now)).count();
    }

private:
    std::chrono::steady_clock::time_point last_ = std::chrono::steady_clock::now();
};

[[noreturn]] void refuse(std::string message, std::string help) {
    throw InputError({Diagnostic{Severity::error, {}, std::move(message), std::move(help)}});
}

void check_range(double from_hz, double to_hz, int points) {
    if (!(from_hz > 0) || !std::isfinite(to_hz))
        refuse(fmt::format("the sweep starts at {:.6g} MHz: frequencies must be above zero", from_hz / 1e6), "");
    if (to_hz < from_hz)
        refuse(fmt::format("the sweep ends at {:.6g} MHz, below its start at {:.6g} MHz", to_hz / 1e6, from_hz / 1e6),
               "exchange the two");
    if (points < 1 || points > most_points)
        refuse(fmt::format("a sweep of {} points: between 1 and {} are possible", points, most_points), "");
    if (points == 1 && from_hz != to_hz) refuse("one point cannot sweep a range", "ask for at least 2 points");
}

MeshOptions mesh_options(const Model& model, double top_frequency_hz, const SolveOptions& solve) {
    MeshOptions options;
    options.top_frequency_hz = top_frequency_hz;
    options.memory_limit_bytes = solve.memory_limit_bytes;
    options.refine = solve.refine;
    if (model.accuracy.cells_per_wavelength) options.cells_per_wavelength = *model.accuracy.cells_per_wavelength;
    if (model.accuracy.cells_across) options.cells_across = *model.accuracy.cells_across;
    return options;
}

std::vector<std::string> cautions_of(const Model& model) {
    std::vector<std::string> cautions;
    for (const Laminate& laminate : model.laminates)
        if (laminate.permittivity_z)
            cautions.push_back(fmt::format(
                "laminate '{}' is anisotropic: its effective isotropic permittivity is used, without the change of "
                "thickness that goes with it",
                laminate.name));
    return cautions;
}

/// Cells and sheets together, before any matrix is allocated: an edge belongs to two cells, a column of a sheet has one
/// vertical flux and half of its lateral fluxes in every layer.
void refuse_too_large(const Mesh& mesh, double limit_bytes) {
    double unknowns = 0;
    for (const Cell& cell : mesh.cells) unknowns += 0.5 * cell.corners();
    double statics = 0;  // each layer has some 25 columns of layers near it, and its vertical flux 2 unknowns per layer
    for (const SheetMesh& sheet : mesh.sheets) {
        const double layers = sheet.layers(), columns = static_cast<double>(sheet.columns.size());
        for (const auto& column : sheet.columns)
            unknowns += 1 + (column.kind == CellKind::quadrilateral ? 2.0 : 1.5) * layers;
        statics += 12.0 * 25 * columns * layers * layers * std::pow(1 + 2 * layers, 2);
    }
    const double bytes = matrix_bytes(unknowns) + statics;
    if (limit_bytes <= 0 || bytes <= limit_bytes) return;
    throw NumericalError(
        fmt::format("the mesh has about {:.0f} unknowns and would take {:.1f} GB; {:.1f} GB are at hand: use "
                    "fewer layers, a smaller sheet, a lower top frequency or fewer cells per wavelength",
                    unknowns, bytes / 1e9, limit_bytes / 1e9));
}

void refuse_static_laminate(const Model& model) {
    if (!model.laminates.empty() && model.accuracy.laminate == LaminateMethod::fixed_static)
        refuse("laminate = \"static\" is not available yet",
               "use laminate = \"full\", or --in-air to leave the sheets out");
}

void read_network(SolvedModel& solved) {
    solved.reference_ohm = references_ohm(solved.model);
    solved.curves = port_curves(solved.model, solved.points);
    for (const auto& point : solved.points)
        solved.network.push_back(
            network_point(point.frequency_hz, terminal_admittance(solved.model, point.frequency_hz, point.admittance_s),
                          solved.reference_ohm));
}

void judge_network(SolvedModel& solved) {
    const auto& goal = solved.model.goal;
    for (const auto& curve : solved.curves) {
        if (!goal.band) continue;
        if (const auto match = band_match(curve, goal.band->from_hz, goal.band->to_hz))
            solved.goals.push_back({curve.port, *match, match->worst_vswr <= goal.vswr});
        else
            solved.cautions.push_back(fmt::format("the sweep does not cover the goal's band, {:.6g} to {:.6g} MHz",
                                                  goal.band->from_hz / 1e6, goal.band->to_hz / 1e6));
    }
}

// Bounds of an ordinary solution: what lies outside points to a mesh or a model that the numbers do not fit.
void judge_quality(SolvedModel& solved) {
    const auto& worst = solved.worst;
    const auto caution = [&](std::string text) { solved.cautions.push_back(std::move(text)); };
    if (worst.relative_residual > 1e-10)
        caution(fmt::format("the equations are solved to a residual of {:.1e} only", worst.relative_residual));
    if (worst.reciprocal_condition < 1e-12)
        caution(fmt::format("the matrix is nearly singular: condition number {:.1e}", 1 / worst.reciprocal_condition));
    if (worst.asymmetry > 1e-6) caution(fmt::format("the ports are reciprocal to {:.1e} only", worst.asymmetry));
    for (const PowerBalance& balance : solved.balances)
        if (!(std::abs(balance.ratio() - 1) < 5e-3))
            caution(fmt::format("at {:.6g} MHz radiation and loss are {:.2f} % of the power into the port",
                                balance.frequency_hz / 1e6, 100 * balance.ratio()));
}

}  // namespace

std::vector<double> sweep_frequencies(const SweepRange& range, const FrequencyChoice& choice) {
    const bool range_chosen = choice.from_hz || choice.to_hz || choice.points;
    auto at = !choice.at_hz.empty() ? choice.at_hz : range_chosen ? std::vector<double>{} : range.at_hz;
    if (!at.empty()) {
        std::sort(at.begin(), at.end());
        at.erase(std::unique(at.begin(), at.end()), at.end());
        check_range(at.front(), at.back(), static_cast<int>(at.size()) + 1);
        return at;
    }
    const double from_hz = choice.from_hz.value_or(range.from_hz), to_hz = choice.to_hz.value_or(range.to_hz);
    const int points = choice.points.value_or(range.points > 0 ? range.points : 101);
    if (from_hz == 0 && to_hz == 0)
        refuse("no frequencies: the model has no [sweep]", "add one, or give --from, --to and --points, or --at");
    check_range(from_hz, to_hz, points);
    std::vector<double> frequencies;
    for (int i = 0; i < points; ++i)
        frequencies.push_back(points == 1 ? from_hz : from_hz + (to_hz - from_hz) * i / (points - 1));
    frequencies.erase(std::unique(frequencies.begin(), frequencies.end()), frequencies.end());
    return frequencies;
}

SolvedModel solve_model(Model model, const SolveOptions& options, Progress* progress) {
    StopWatch total, stage;
    Timing timing;
    auto frequencies = sweep_frequencies(model.sweep, options.frequencies);
    if (model.ports.empty()) refuse("the model has no port, so there is nothing to sweep", "add a [[port]]");

    refuse_static_laminate(model);

    checkpoint(progress, "mesh", 0, 0);
    auto mesh = make_mesh(model, mesh_options(model, frequencies.back(), options));
    refuse_too_large(mesh, options.memory_limit_bytes);
    timing.mesh_s = stage.lap();

    checkpoint(progress, "assemble", 0, 0);
    Operator op(std::move(mesh), model.lumped);
    SolvedModel solved{std::move(model), std::move(op), {}, {}, {}, {}, {}, {}, {}, {}, {}, {}, 0, {}, 0, {}, {}};
    timing.assemble_s = stage.lap();

    auto swept = sweep_model(solved.op, solved.model, frequencies, options, progress);
    timing.factor_s = swept.factor_s;
    timing.assemble_s += stage.lap() - timing.factor_s;

    solved.frequency_hz = std::move(swept.frequency_hz);
    solved.points = std::move(swept.points);
    solved.resonances = std::move(swept.resonances);
    solved.balances = std::move(swept.balances);
    solved.solved_hz = std::move(swept.solved_hz);
    solved.full_solves = swept.full_solves;
    solved.reflection_error = swept.reflection_error;
    solved.worst = swept.worst;
    solved.cautions = cautions_of(solved.model);
    read_network(solved);
    judge_network(solved);
    judge_quality(solved);
    timing.post_s = stage.lap();
    timing.total_s = total.lap();
    solved.timing = timing;
    return solved;
}

}  // namespace annulet
