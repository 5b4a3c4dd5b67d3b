#include <annulet/core/diagnostics.hpp>
#include <annulet/study/solve.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <chrono>
#include <cmath>
#include <utility>

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

MeshOptions mesh_options(const Model& model, double top_frequency_hz, double memory_limit_bytes) {
    MeshOptions options;
    options.top_frequency_hz = top_frequency_hz;
    options.memory_limit_bytes = memory_limit_bytes;
    if (model.accuracy.cells_per_wavelength) options.cells_per_wavelength = *model.accuracy.cells_per_wavelength;
    if (model.accuracy.cells_across) options.cells_across = *model.accuracy.cells_across;
    return options;
}

std::vector<std::string> cautions_of(const Model& model) {
    std::vector<std::string> cautions;
    if (!model.laminates.empty())
        cautions.push_back(fmt::format(
            "{} read and placed, but the laminate does not yet enter the solution: the metal is solved in air, "
            "and on the real board every resonance lies lower",
            model.laminates.size() == 1 ? "laminate '" + model.laminates.front().name + "' is"
                                        : fmt::format("{} laminates are", model.laminates.size())));
    if (model.accuracy.resonance_fraction)
        cautions.push_back("[accuracy] resonance is read, but the mesh is not yet refined to meet it");
    return cautions;
}

void read_network(SolvedModel& solved) {
    std::vector<std::optional<FeedLine>> lines;
    for (const auto& port : solved.model.ports) {
        solved.reference_ohm.push_back(port.reference_ohm);
        lines.push_back(port.line);
        solved.curves.push_back({port.name, port.reference_ohm, solved.frequency_hz, {}});
    }
    for (const auto& point : solved.points) {
        const auto admittance = behind_lines(point.frequency_hz, point.admittance_s, lines);
        solved.network.push_back(network_point(point.frequency_hz, admittance, solved.reference_ohm));
        for (std::size_t p = 0; p < solved.curves.size(); ++p)
            solved.curves[p].impedance_ohm.push_back(
                input_impedance_ohm(admittance, solved.reference_ohm, static_cast<int>(p)));
    }
}

void judge_network(SolvedModel& solved) {
    const auto& goal = solved.model.goal;
    for (const auto& curve : solved.curves) {
        const auto found = find_resonances(curve, goal.vswr);
        solved.resonances.insert(solved.resonances.end(), found.begin(), found.end());
        if (!goal.band) continue;
        if (const auto match = band_match(curve, goal.band->from_hz, goal.band->to_hz))
            solved.goals.push_back({curve.port, *match, match->worst_vswr <= goal.vswr});
        else
            solved.cautions.push_back(fmt::format("the sweep does not cover the goal's band, {:.6g} to {:.6g} MHz",
                                                  goal.band->from_hz / 1e6, goal.band->to_hz / 1e6));
    }
}

SolveQuality worst_of(const std::vector<SweepPoint>& points) {
    SolveQuality worst{0, 1};
    for (const auto& point : points) {
        worst.relative_residual = std::max(worst.relative_residual, point.quality.relative_residual);
        worst.reciprocal_condition = std::min(worst.reciprocal_condition, point.quality.reciprocal_condition);
    }
    return worst;
}

/// Part of the sweep's time that went into factorising and solving, the rest being filled matrices.
double factor_share(const std::vector<SweepPoint>& points) {
    double fill_s = 0, factor_s = 0;
    for (const auto& point : points) {
        fill_s += point.fill_s;
        factor_s += point.factor_s;
    }
    return factor_s > 0 ? factor_s / (fill_s + factor_s) : 0;
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

    checkpoint(progress, "mesh", 0, 0);
    auto mesh = make_mesh(model, mesh_options(model, frequencies.back(), options.memory_limit_bytes));
    timing.mesh_s = stage.lap();

    checkpoint(progress, "assemble", 0, 0);
    Operator op(std::move(mesh), model.lumped);
    SolvedModel solved{
        std::move(model), std::move(op), std::move(frequencies), {}, {}, {}, {}, {}, {}, {}, 0, 0, {}, {}};
    timing.assemble_s = stage.lap();

    solved.points =
        sweep_every_point(solved.op, solved.frequency_hz, {options.keep_currents, options.threads}, progress);
    solved.full_solves = static_cast<int>(solved.points.size());
    const double swept_s = stage.lap();
    timing.factor_s = swept_s * factor_share(solved.points);
    timing.assemble_s += swept_s - timing.factor_s;

    solved.worst = worst_of(solved.points);
    solved.cautions = cautions_of(solved.model);
    read_network(solved);
    judge_network(solved);
    timing.post_s = stage.lap();
    timing.total_s = total.lap();
    solved.timing = timing;
    return solved;
}

}  // namespace annulet
