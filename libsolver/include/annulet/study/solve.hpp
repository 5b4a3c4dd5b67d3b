// The main path once: model, mesh, operator, sweep, network parameters. Other studies and commands start here.
#pragma once

#include <annulet/analysis/network.hpp>
#include <annulet/analysis/power_balance.hpp>
#include <annulet/core/progress.hpp>
#include <annulet/model/model.hpp>
#include <annulet/mom/operator.hpp>
#include <annulet/sweep/sweep.hpp>

#include <optional>
#include <string>
#include <vector>

namespace annulet {

/// What takes the place of the model's own `[sweep]`; empty fields leave the model's.
struct FrequencyChoice {
    std::optional<double> from_hz;
    std::optional<double> to_hz;
    std::optional<int> points;
    std::vector<double> at_hz;
};

/// Frequencies in hertz, ascending, without repetition. Throws InputError where they make no sweep.
std::vector<double> sweep_frequencies(const SweepRange& range, const FrequencyChoice& choice = {});

struct SolveOptions {
    FrequencyChoice frequencies;
    double memory_limit_bytes = 0;  ///< of the matrix, see MeshOptions
    int threads = 0;                ///< see SweepOptions
    bool keep_currents = false;
    double refine = 1;         ///< see MeshOptions
    bool every_point = false;  ///< exact fill and full factorisation at every frequency
};

/// Wall-clock seconds. `assemble_s`: what is done once per geometry and filling the matrices; `factor_s`: factorising
/// them and solving.
struct Timing {
    double mesh_s = 0, assemble_s = 0, factor_s = 0, post_s = 0, total_s = 0;
};

/// Match of one port over the goal's band.
struct PortGoal {
    std::string port;
    BandMatch match;
    bool reached = false;
};

struct SolvedModel {
    Model model;
    Operator op;
    std::vector<double> frequency_hz;    ///< those asked for and, around resonances sharper than their step, more
    std::vector<double> reference_ohm;   ///< per port
    std::vector<SweepPoint> points;      ///< at the gaps; currents only if kept
    std::vector<NetworkPoint> network;   ///< at the far ends of the ports' feed lines
    std::vector<PortCurve> curves;       ///< one per port
    std::vector<Resonance> resonances;   ///< of all ports, port by port
    std::vector<PortGoal> goals;         ///< empty: no goal band, or the sweep does not cover it
    std::vector<PowerBalance> balances;  ///< of the first port, at up to three frequencies
    SolveQuality worst;                  ///< over all frequencies solved
    std::vector<double> solved_hz;       ///< where the full matrix was solved
    int full_solves = 0;
    std::vector<std::vector<double>> reflection_uncertainty;  ///< of |S11| by port and frequency; empty: not estimated
    double reflection_error = 0;  ///< largest error that the sweep adds to |S11|; 0: every point exact
    std::vector<std::string> cautions;
    Timing timing;
};

/// Meshes for the highest frequency and solves: from a reduced basis, at few frequencies and on demand exactly.
/// Throws InputError, NumericalError, Cancelled.
SolvedModel solve_model(Model model, const SolveOptions& options, Progress* progress = nullptr);

}  // namespace annulet
