// Port parameters of one solved model: Z, Y, S, what they say of match and resonance. Plain data.
#pragma once

#include <Eigen/Core>

#include <complex>
#include <optional>
#include <string>
#include <vector>

namespace annulet {

struct FeedLine;

struct NetworkPoint {
    double frequency_hz = 0;
    Eigen::MatrixXcd admittance_s, impedance_ohm, scattering;
};

/// Z and S from Y (ports x ports) at one frequency; S by real port references, for which power waves and
/// travelling waves agree [Kurokawa1965]. Throws NumericalError where Y has no inverse.
NetworkPoint network_point(double frequency_hz, const Eigen::MatrixXcd& admittance_s,
                           const std::vector<double>& reference_ohm);

/// Y seen at the far ends of lossless lines, one entry per port, empty: no line there [Pozar2012, section 4.3].
Eigen::MatrixXcd behind_lines(double frequency_hz, const Eigen::MatrixXcd& admittance_s,
                              const std::vector<std::optional<FeedLine>>& lines);

/// Input impedance of port `port` with every other port terminated in its reference.
std::complex<double> input_impedance_ohm(const Eigen::MatrixXcd& admittance_s, const std::vector<double>& reference_ohm,
                                         int port);

/// (Z - R)/(Z + R) for a real reference R.
std::complex<double> reflection(std::complex<double> impedance_ohm, double reference_ohm);

/// Of a reflection coefficient; magnitudes at or above 1 give infinite VSWR.
double return_loss_db(std::complex<double> reflection);  ///< positive for a passive port [Bird2009]
double vswr(std::complex<double> reflection);
double mismatch_loss_db(std::complex<double> reflection);  ///< -10 log10(1 - |S11|^2)

enum class ResonanceKind { series, parallel, match, mode };

struct Resonance {
    std::string port;
    ResonanceKind kind = ResonanceKind::match;
    double frequency_hz = 0;
    double resistance_ohm = 0;
    double q = 0;               ///< Q_Z of [Yaghjian2005], from the slope of the impedance
    double q_mode = 0;          ///< of the natural mode it belongs to, |w| / 2|sigma|; 0: not known
    double bandwidth_hz = 0;    ///< where VSWR is below the goal's around it, ends of the sweep included; 0: nowhere
    double uncertainty_hz = 0;  ///< half-width; 0: not estimated
};

/// One port's curve: `frequency_hz` ascending, `impedance_ohm` the input impedance with the other ports
/// terminated in their references.
struct PortCurve {
    std::string port;
    double reference_ohm = 50;
    std::vector<double> frequency_hz;
    std::vector<std::complex<double>> impedance_ohm;
};

/// S11 minima and X = 0 of both kinds, sharpened between grid points, ascending in frequency. A minimum of
/// |S11| counts as a match where |S11|^2 falls by at least 0.01 from both sides: shallower ones are ripple.
std::vector<Resonance> find_resonances(const PortCurve& curve, double goal_vswr);

/// Match of a port over a band.
struct BandMatch {
    double worst_vswr = 0;
    double worst_at_hz = 0;
};

/// Worst VSWR between `from_hz` and `to_hz`, between grid points too; empty where the sweep does not cover the band.
std::optional<BandMatch> band_match(const PortCurve& curve, double from_hz, double to_hz);

}  // namespace annulet
