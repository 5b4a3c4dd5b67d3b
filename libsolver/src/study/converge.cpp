// Symbols of [Roache1994]: r ratio of cell sizes, p order, F factor of safety.
#include <annulet/mom/affine.hpp>
#include <annulet/numerics/local_rational.hpp>
#include <annulet/study/converge.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <optional>
#include <utility>
#include <vector>

namespace annulet {
namespace {

constexpr double step = 1.5;
constexpr double formal_order = 2, least_order = 0.5;
constexpr double safety_assumed = 3, safety_observed = 1.25;
/// Fills, affine nodes and factorisations of an ordinary sweep, for an estimate of memory.
constexpr int usual_fills = 9, usual_nodes = 14, usual_factors = 6;

bool only_wires(const Mesh& mesh) {
    return std::all_of(mesh.cells.begin(), mesh.cells.end(), [](auto& c) { return c.kind == CellKind::segment; });
}

/// Numbers of cells are whole, so the ratio of sizes is taken from what became of them.
double size_ratio(const SolvedModel& coarse, const SolvedModel& fine) {
    const double count = static_cast<double>(fine.op.unknowns()) / coarse.op.unknowns();
    return only_wires(fine.op.mesh()) ? count : std::sqrt(count);
}

std::optional<double> same_resonance_hz(const Resonance& sought, const std::vector<Resonance>& among) {
    std::optional<double> best;
    for (const Resonance& r : among) {
        if (r.port != sought.port || r.kind != sought.kind) continue;
        if (!best || std::abs(r.frequency_hz - sought.frequency_hz) < std::abs(*best - sought.frequency_hz))
            best = r.frequency_hz;
    }
    // A neighbour of the same kind is no partner.
    if (best && std::abs(*best - sought.frequency_hz) > 0.1 * sought.frequency_hz) return std::nullopt;
    return best;
}

class Refinement {
public:
    Refinement(const Model& model, const SolveOptions& options, const ConvergeOptions& converge, Progress* progress)
        : model_(model), options_(options), converge_(converge), progress_(progress) {}

    SolvedModel run() {
        solve(1 / step);
        solve(1);
        judge();
        while (wanted() && !certain() && can_refine()) {
            solve(refine_ * step);
            judge();
        }
        if (wanted() && !certain()) say_not_reached();
        return std::move(solved_.back());
    }

private:
    bool wanted() const { return model_.accuracy.resonance_fraction.has_value(); }

    void solve(double refine) {
        refine_ = refine;
        auto options = options_;
        options.refine *= refine;
        solved_.push_back(solve_model(model_, options, progress_));
        if (solved_.size() > 3) solved_.erase(solved_.begin());
    }

    void judge() {
        SolvedModel& fine = solved_.back();
        for (Resonance& r : fine.resonances) r.uncertainty_hz = uncertainty_hz(r);
        const SolvedModel& coarse = solved_[solved_.size() - 2];
        const double ratio = size_ratio(coarse, fine);
        for (std::size_t p = 0; p < fine.curves.size(); ++p)
            fine.reflection_uncertainty.push_back(reflection_uncertainty(coarse.curves[p], fine.curves[p], ratio));
    }

    /// 0 where a mesh shows no such resonance.
    double uncertainty_hz(const Resonance& r) const {
        const std::size_t n = solved_.size();
        const auto before = same_resonance_hz(r, solved_[n - 2].resonances);
        if (!before) return 0;
        const double last = r.frequency_hz - *before, last_ratio = size_ratio(solved_[n - 2], solved_[n - 1]);
        const auto first = n > 2 ? same_resonance_hz(r, solved_[n - 3].resonances) : std::nullopt;
        if (!first) return two_mesh_uncertainty(last, last_ratio);
        return three_mesh_uncertainty(*before - *first, size_ratio(solved_[n - 3], solved_[n - 2]), last, last_ratio);
    }

    static std::vector<double> reflection_uncertainty(const PortCurve& coarse, const PortCurve& fine, double ratio) {
        const auto reflections = [](const PortCurve& curve) {
            std::vector<std::complex<double>> all;
            for (const auto& z : curve.impedance_ohm) all.push_back(reflection(z, curve.reference_ohm));
            return all;
        };
        const LocalRational before(coarse.frequency_hz, reflections(coarse));
        const auto now = reflections(fine);
        std::vector<double> uncertainty;
        for (std::size_t i = 0; i < now.size(); ++i)
            uncertainty.push_back(
                two_mesh_uncertainty(std::abs(now[i]) - std::abs(before.value(fine.frequency_hz[i])), ratio));
        return uncertainty;
    }

    bool certain() const {
        const auto& found = solved_.back().resonances;
        return std::all_of(found.begin(), found.end(), [&](const Resonance& r) {
            return r.uncertainty_hz > 0 && r.uncertainty_hz <= *model_.accuracy.resonance_fraction * r.frequency_hz;
        });
    }

    bool can_refine() {
        const SolvedModel& now = solved_.back();
        const double growth = only_wires(now.op.mesh()) ? step : step * step;
        const int unknowns = static_cast<int>(growth * now.op.unknowns());
        const int charges = static_cast<int>(growth * static_cast<double>(now.op.basis().divergence.rows()));
        const double bytes = affine_memory(unknowns, charges, usual_fills, usual_nodes, usual_factors).peak_bytes;
        const double seconds = now.timing.total_s * growth * growth;
        if (++meshes_ >= converge_.most_meshes)
            why_ = fmt::format("{} meshes were tried", meshes_ + 1);
        else if (options_.memory_limit_bytes > 0 && bytes > options_.memory_limit_bytes)
            why_ = fmt::format("the next mesh, of {} unknowns, needs {:.1f} GB", unknowns, bytes / 1e9);
        else if (seconds > converge_.time_limit_s)
            why_ = fmt::format("the next mesh, of {} unknowns, would take {:.0f} s", unknowns, seconds);
        return why_.empty();
    }

    void say_not_reached() {
        SolvedModel& fine = solved_.back();
        double worst = 0;
        for (const Resonance& r : fine.resonances) worst = std::max(worst, r.uncertainty_hz / r.frequency_hz);
        fine.cautions.push_back(
            fmt::format("[accuracy] asks for resonances within {:.3g} %, they are certain to {:.2g} %: {}",
                        100 * *model_.accuracy.resonance_fraction, 100 * worst,
                        why_.empty() ? "some appear on the finer mesh only" : why_));
    }

    const Model& model_;
    SolveOptions options_;
    ConvergeOptions converge_;
    Progress* progress_;
    std::vector<SolvedModel> solved_;
    double refine_ = 1;
    int meshes_ = 1;
    std::string why_;
};

}  // namespace

double two_mesh_uncertainty(double difference, double ratio) {
    return safety_assumed * std::abs(difference) / (std::pow(ratio, formal_order) - 1);
}

double three_mesh_uncertainty(double first_difference, double first_ratio, double last_difference, double last_ratio) {
    const double shrink = first_difference / last_difference;
    if (!(shrink > 1)) return two_mesh_uncertainty(last_difference, last_ratio);
    // With the same ratio r twice, shrink = r^p; the mean of nearly equal ratios serves as well.
    const double order =
        std::clamp(std::log(shrink) / (0.5 * std::log(first_ratio * last_ratio)), least_order, formal_order);
    return safety_observed * std::abs(last_difference) / (std::pow(last_ratio, order) - 1);
}

SolvedModel solve_with_error_bars(const Model& model, const SolveOptions& options, const ConvergeOptions& converge,
                                  Progress* progress) {
    return Refinement(model, options, converge, progress).run();
}

}  // namespace annulet
