// Symbols: f frequency (Hz), w = 2 pi f, Z = R + jX input impedance, R0 port reference,
//          g = (Z - R0)/(Z + R0) reflection, s VSWR.
// Work is done on g rather than Z: it is bounded, and Im g has the sign of X.
#include <annulet/analysis/network.hpp>
#include <annulet/numerics/local_rational.hpp>
#include <annulet/numerics/roots.hpp>

#include <algorithm>
#include <cmath>

namespace annulet {
namespace {

using Complex = std::complex<double>;
constexpr int samples_per_interval = 8;
constexpr double least_dip = 0.01;

LocalRational reflection_curve(const PortCurve& curve) {
    std::vector<Complex> reflections;
    for (const auto& impedance : curve.impedance_ohm) reflections.push_back(reflection(impedance, curve.reference_ohm));
    return {curve.frequency_hz, std::move(reflections)};
}

/// Grid points and `samples_per_interval - 1` more in each interval.
std::vector<double> fine_grid(const std::vector<double>& coarse) {
    std::vector<double> fine;
    for (std::size_t i = 0; i + 1 < coarse.size(); ++i)
        for (int k = 0; k < samples_per_interval; ++k)
            fine.push_back(coarse[i] + (coarse[i + 1] - coarse[i]) * k / samples_per_interval);
    if (!coarse.empty()) fine.push_back(coarse.back());
    return fine;
}

std::vector<double> sample(const RealFunction& curve, const std::vector<double>& at) {
    std::vector<double> values(at.size());
    std::transform(at.begin(), at.end(), values.begin(), curve);
    return values;
}

/// Q_Z = (w / 2R) |R' + j (X' + |X|/w)|, primes d/dw [Yaghjian2005].
double quality_factor(const LocalRational& g, double reference_ohm, double frequency_hz) {
    const Complex reflection = g.value(frequency_hz);
    const Complex impedance = reference_ohm * (1.0 + reflection) / (1.0 - reflection);
    // f dZ/df = w dZ/dw, with dZ/dg = 2 R0 / (1 - g)^2.
    const Complex slope =
        frequency_hz * g.derivative(frequency_hz) * 2.0 * reference_ohm / ((1.0 - reflection) * (1.0 - reflection));
    return std::abs(slope + Complex(0, std::abs(impedance.imag()))) / (2 * impedance.real());
}

/// First frequency from `start` on in the direction of `step` where `excess` turns positive; the end of the grid if
/// none.
double band_edge(const RealFunction& excess, const std::vector<double>& grid, double start, int step) {
    auto next = std::upper_bound(grid.begin(), grid.end(), start) - grid.begin();
    if (step < 0) --next;
    double inside = start;
    for (; next >= 0 && next < static_cast<std::ptrdiff_t>(grid.size()); next += step) {
        const double here = grid[static_cast<std::size_t>(next)];
        if (excess(here) > 0) return bracketed_root(excess, std::min(inside, here), std::max(inside, here));
        inside = here;
    }
    return inside;
}

class Finder {
public:
    Finder(const PortCurve& curve, double goal_vswr)
        : curve_(curve), goal_vswr_(goal_vswr), g_(reflection_curve(curve)), grid_(fine_grid(curve.frequency_hz)) {}

    std::vector<Resonance> find() {
        find_reactance_zeros();
        find_matches();
        std::stable_sort(found_.begin(), found_.end(),
                         [](const auto& a, const auto& b) { return a.frequency_hz < b.frequency_hz; });
        return found_;
    }

private:
    void find_reactance_zeros() {
        const RealFunction reactance_sign = [this](double f) { return g_.value(f).imag(); };
        const auto values = sample(reactance_sign, grid_);
        for (std::size_t i = 0; i + 1 < grid_.size(); ++i) {
            const bool crosses = (values[i] < 0 && values[i + 1] >= 0) || (values[i] > 0 && values[i + 1] <= 0);
            if (!crosses) continue;
            add(values[i] < 0 ? ResonanceKind::series : ResonanceKind::parallel,
                bracketed_root(reactance_sign, grid_[i], grid_[i + 1]));
        }
    }

    void find_matches() {
        const auto power = sample([this](double f) { return std::norm(g_.value(f)); }, grid_);
        // Half the derivative of |g|^2.
        const RealFunction slope = [this](double f) { return (std::conj(g_.value(f)) * g_.derivative(f)).real(); };
        for (std::size_t i = 1; i + 1 < grid_.size(); ++i) {
            if (!(power[i] < power[i - 1] && power[i] <= power[i + 1]) || !deep(power, i)) continue;
            const double low = grid_[i - 1], high = grid_[i + 1];
            const bool bracketed = slope(low) < 0 && slope(high) > 0;
            add(ResonanceKind::match, bracketed ? bracketed_root(slope, low, high) : grid_[i]);
        }
    }

    static bool deep(const std::vector<double>& power, std::size_t minimum) {
        const auto rises = [&](int step) {
            auto i = static_cast<std::ptrdiff_t>(minimum);
            for (; i >= 0 && i < static_cast<std::ptrdiff_t>(power.size()); i += step) {
                const double rise = power[static_cast<std::size_t>(i)] - power[minimum];
                if (rise >= least_dip) return true;
                if (rise < 0) return false;
            }
            return false;
        };
        return rises(-1) && rises(1);
    }

    void add(ResonanceKind kind, double frequency_hz) {
        const Complex reflection = g_.value(frequency_hz);
        Resonance resonance;
        resonance.port = curve_.port;
        resonance.kind = kind;
        resonance.frequency_hz = frequency_hz;
        resonance.resistance_ohm = (curve_.reference_ohm * (1.0 + reflection) / (1.0 - reflection)).real();
        resonance.q = quality_factor(g_, curve_.reference_ohm, frequency_hz);
        resonance.bandwidth_hz = bandwidth(frequency_hz);
        found_.push_back(std::move(resonance));
    }

    double bandwidth(double frequency_hz) const {
        const double limit = (goal_vswr_ - 1) / (goal_vswr_ + 1);
        const RealFunction excess = [this, limit](double f) { return std::abs(g_.value(f)) - limit; };
        if (excess(frequency_hz) >= 0) return 0;
        return band_edge(excess, grid_, frequency_hz, 1) - band_edge(excess, grid_, frequency_hz, -1);
    }

    const PortCurve& curve_;
    double goal_vswr_;
    LocalRational g_;
    std::vector<double> grid_;
    std::vector<Resonance> found_;
};

}  // namespace

std::vector<Resonance> find_resonances(const PortCurve& curve, double goal_vswr) {
    if (curve.frequency_hz.size() < 2) return {};
    return Finder(curve, goal_vswr).find();
}

std::optional<BandMatch> band_match(const PortCurve& curve, double from_hz, double to_hz) {
    if (curve.frequency_hz.empty() || curve.frequency_hz.front() > from_hz || curve.frequency_hz.back() < to_hz)
        return std::nullopt;
    const auto g = reflection_curve(curve);
    BandMatch worst;
    const auto look = [&](double frequency_hz) {
        const double here = vswr(g.value(frequency_hz));
        if (here > worst.worst_vswr) worst = {here, frequency_hz};
    };
    for (const double frequency_hz : fine_grid(curve.frequency_hz))
        if (frequency_hz > from_hz && frequency_hz < to_hz) look(frequency_hz);
    look(from_hz);
    look(to_hz);
    return worst;
}

}  // namespace annulet
