// The frequencies of one model solved, in either way, with what is needed to find its resonances.
#pragma once

#include <annulet/analysis/power_balance.hpp>
#include <annulet/study/solve.hpp>

#include <vector>

namespace annulet {

struct Swept {
    std::vector<double> frequency_hz;  ///< those asked for and, around sharp resonances, more
    std::vector<SweepPoint> points;
    std::vector<Resonance> resonances;
    std::vector<PowerBalance> balances;
    std::vector<double> solved_hz;
    int full_solves = 0;
    double reflection_error = 0;
    SolveQuality worst{0, 1, 0};
    double fill_s = 0, factor_s = 0;
};

/// Exact at every frequency if asked for or if they are few, else from a reduced basis.
Swept sweep_model(const Operator& op, const Model& model, const std::vector<double>& frequency_hz,
                  const SolveOptions& options, Progress* progress);

/// Input impedances of all ports at the far ends of their lines.
std::vector<PortCurve> port_curves(const Model& model, const std::vector<SweepPoint>& points);

/// Y at the far ends of the ports' lines.
Eigen::MatrixXcd terminal_admittance(const Model& model, double frequency_hz, const Eigen::MatrixXcd& admittance_s);

/// Reference resistances of the ports, ohm.
std::vector<double> references_ohm(const Model& model);

}  // namespace annulet
