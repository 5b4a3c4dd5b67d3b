#include "study/swept.hpp"

#include <annulet/core/constants.hpp>
#include <annulet/mom/affine.hpp>
#include <annulet/sweep/reduced_basis.hpp>

#include <algorithm>
#include <cmath>
#include <iterator>
#include <optional>
#include <span>
#include <utility>

namespace annulet {
namespace {

/// Fewer frequencies than a reduced basis takes exact fills and solutions.
constexpr std::size_t few_points = 12;
constexpr std::size_t search_points = 1001;
constexpr double open_port_ohm = 1e7;
constexpr std::size_t most_balances = 3;
constexpr double least_visible = 5e-3;  ///< change of S that is worth points of its own

void sort_unique(std::vector<double>& values) {
    std::sort(values.begin(), values.end());
    const auto same = [](double a, double b) { return b - a <= 1e-12 * b; };
    values.erase(std::unique(values.begin(), values.end(), same), values.end());
}

/// Adds frequencies at multiples of a half-width around `center_hz`, within the range of `grid` as it was.
void add_cluster(std::vector<double>& grid, double low_hz, double high_hz, double center_hz, double half_width_hz) {
    for (const double x : {0.0, 0.125, 0.25, 0.5, 0.75, 1.0, 1.5, 2.0, 3.0, 5.0, 8.0, 16.0})
        for (const double at : {center_hz - x * half_width_hz, center_hz + x * half_width_hz})
            if (at >= low_hz && at <= high_hz) grid.push_back(at);
}

class ReducedStudy {
public:
    ReducedStudy(const Operator& op, const Model& model, const std::vector<double>& frequency_hz, Progress* progress)
        : model_(model),
          asked_hz_(frequency_hz),
          affine_(op, frequency_hz.back(), {}, progress),
          sweep_(affine_, frequency_hz.front(), frequency_hz.back(), options(), progress) {}

    Swept result(bool keep_currents) const {
        Swept swept;
        swept.frequency_hz = printed_grid();
        swept.points = sweep_.evaluate(swept.frequency_hz, keep_currents);
        swept.resonances = resonances();
        swept.balances = balances(swept.resonances);
        swept.solved_hz = sweep_.solved_hz();
        swept.full_solves = sweep_.full_solves();
        swept.reflection_error = sweep_.reflection_error();
        swept.worst = sweep_.worst();
        swept.fill_s = sweep_.fill_s();
        swept.factor_s = sweep_.factor_s();
        return swept;
    }

private:
    ReducedOptions options() const {
        ReducedOptions options;
        options.reference_ohm = references_ohm(model_);
        options.scattering = [this](double f, const Eigen::MatrixXcd& y) {
            return network_point(f, terminal_admittance(model_, f, y), references_ohm(model_)).scattering;
        };
        return options;
    }

    Eigen::MatrixXcd scattering(double f) const { return options().scattering(f, sweep_.admittance_s(f)); }

    /// A mode that no port notices needs no points of its own: S at it against the mean of S on either side.
    bool shows(const ReducedPole& pole) const {
        const double f = pole.frequency_hz(), away = f / pole.q();
        if (f - away < asked_hz_.front() || f + away > asked_hz_.back()) return false;
        const Eigen::MatrixXcd around = 0.5 * (scattering(f - away) + scattering(f + away));
        return (scattering(f) - around).cwiseAbs().maxCoeff() > least_visible;
    }

    std::vector<double> printed_grid() const {
        auto grid = asked_hz_;
        const double step = (grid.back() - grid.front()) / static_cast<double>(grid.size() - 1);
        for (const ReducedPole& pole : sweep_.poles()) {
            const double half_width = pole.frequency_hz() / (2 * pole.q());
            if (half_width < 2 * step && shows(pole))
                add_cluster(grid, asked_hz_.front(), asked_hz_.back(), pole.frequency_hz(), half_width);
        }
        sort_unique(grid);
        return grid;
    }

    /// The grid on which resonances are looked for: their own clusters are added until they stand still.
    std::vector<Resonance> resonances() const {
        const double low = asked_hz_.front(), high = asked_hz_.back();
        std::vector<double> grid;
        const std::size_t count = std::min(search_points, std::max<std::size_t>(asked_hz_.size(), 101));
        for (std::size_t i = 0; i < count; ++i)
            grid.push_back(low + (high - low) * static_cast<double>(i) / static_cast<double>(count - 1));
        for (const ReducedPole& pole : sweep_.poles())
            add_cluster(grid, low, high, pole.frequency_hz(), pole.frequency_hz() / (2 * pole.q()));
        auto found = find(grid);
        for (const Resonance& r : found)
            add_cluster(grid, low, high, r.frequency_hz, 0.02 * r.frequency_hz / std::max(r.q, 1.0));
        found = find(grid);
        const auto modes = port_modes();
        for (Resonance& r : found) r.q_mode = mode_q(r, modes);
        return found;
    }

    std::vector<Resonance> find(std::vector<double>& grid) const {
        sort_unique(grid);
        std::vector<Resonance> found;
        for (const PortCurve& curve : port_curves(model_, sweep_.evaluate(grid, false))) {
            const auto of_port = find_resonances(curve, model_.goal.vswr);
            found.insert(found.end(), of_port.begin(), of_port.end());
        }
        return found;
    }

    /// Modes with one port shorted or open and the others in their references.
    struct PortModes {
        std::vector<ReducedPole> shorted, open;
    };
    std::vector<PortModes> port_modes() const {
        std::vector<PortModes> modes;
        for (std::size_t p = 0; p < model_.ports.size(); ++p) {
            auto termination = references_ohm(model_);
            termination[p] = 0;
            modes.push_back({sweep_.poles(termination), {}});
            termination[p] = open_port_ohm;
            modes.back().open = sweep_.poles(termination);
        }
        return modes;
    }

    /// Q of the nearest mode, of the shorted port (series) or the open one (parallel); a match belongs to the nearer of
    /// both. 0: behind a line, or no mode within the width of the resonance.
    double mode_q(const Resonance& resonance, const std::vector<PortModes>& modes) const {
        const auto& ports = model_.ports;
        const auto port = std::find_if(ports.begin(), ports.end(), [&](auto& p) { return p.name == resonance.port; });
        if (port == ports.end() || port->line) return 0;
        double best_q = 0, best = resonance.frequency_hz / std::max(resonance.q, 1.0);
        const auto look = [&](const std::vector<ReducedPole>& poles) {
            for (const ReducedPole& pole : poles) {
                const double away = std::abs(pole.frequency_hz() - resonance.frequency_hz);
                if (away < best) {
                    best = away;
                    best_q = pole.q();
                }
            }
        };
        const PortModes& own = modes[static_cast<std::size_t>(port - ports.begin())];
        if (resonance.kind != ResonanceKind::parallel) look(own.shorted);
        if (resonance.kind != ResonanceKind::series) look(own.open);
        return best_q;
    }

    std::vector<PowerBalance> balances(const std::vector<Resonance>& resonances) const {
        std::vector<double> at;
        for (const Resonance& r : resonances)
            if (at.size() < most_balances) at.push_back(r.frequency_hz);
        if (at.empty()) at.push_back(0.5 * (asked_hz_.front() + asked_hz_.back()));
        std::vector<PowerBalance> balances;
        for (const double f : at)
            balances.push_back(
                power_balance(affine_.op(), sweep_.currents_a(f).col(0), sweep_.admittance_s(f)(0, 0), f));
        return balances;
    }

    const Model& model_;
    const std::vector<double>& asked_hz_;
    AffineOperator affine_;
    ReducedSweep sweep_;
};

Swept sweep_exactly(const Operator& op, const Model& model, const std::vector<double>& frequency_hz,
                    const SolveOptions& options, Progress* progress) {
    Swept swept;
    swept.frequency_hz = swept.solved_hz = frequency_hz;
    swept.points = sweep_every_point(op, frequency_hz, {options.keep_currents, options.threads}, progress);
    swept.full_solves = static_cast<int>(swept.points.size());
    const SweepPoint& solved = swept.points[swept.points.size() / 2];
    const SweepPoint middle = options.keep_currents ? solved : solve_point(op, solved.frequency_hz);
    swept.balances.push_back(
        power_balance(op, middle.currents_a.col(0), middle.admittance_s(0, 0), middle.frequency_hz));
    for (const SweepPoint& point : swept.points) {
        swept.worst = worse(swept.worst, point.quality);
        swept.fill_s += point.fill_s;
        swept.factor_s += point.factor_s;
    }
    for (const PortCurve& curve : port_curves(model, swept.points)) {
        const auto found = find_resonances(curve, model.goal.vswr);
        swept.resonances.insert(swept.resonances.end(), found.begin(), found.end());
    }
    return swept;
}

}  // namespace

std::vector<double> references_ohm(const Model& model) {
    std::vector<double> references;
    for (const Port& port : model.ports) references.push_back(port.reference_ohm);
    return references;
}

Eigen::MatrixXcd terminal_admittance(const Model& model, double frequency_hz, const Eigen::MatrixXcd& admittance_s) {
    std::vector<std::optional<FeedLine>> lines;
    for (const Port& port : model.ports) lines.push_back(port.line);
    return behind_lines(frequency_hz, admittance_s, lines);
}

std::vector<PortCurve> port_curves(const Model& model, const std::vector<SweepPoint>& points) {
    std::vector<PortCurve> curves;
    const auto references = references_ohm(model);
    for (const Port& port : model.ports) curves.push_back({port.name, port.reference_ohm, {}, {}});
    for (const SweepPoint& point : points) {
        const auto admittance = terminal_admittance(model, point.frequency_hz, point.admittance_s);
        for (std::size_t p = 0; p < curves.size(); ++p) {
            curves[p].frequency_hz.push_back(point.frequency_hz);
            curves[p].impedance_ohm.push_back(input_impedance_ohm(admittance, references, static_cast<int>(p)));
        }
    }
    return curves;
}

Swept sweep_model(const Operator& op, const Model& model, const std::vector<double>& frequency_hz,
                  const SolveOptions& options, Progress* progress) {
    if (options.every_point || frequency_hz.size() <= few_points)
        return sweep_exactly(op, model, frequency_hz, options, progress);
    return ReducedStudy(op, model, frequency_hz, progress).result(options.keep_currents);
}

}  // namespace annulet
