// Port parameters of one solved model: Z, Y, S, what they say of match and resonance. Plain data.
#pragma once

#include <Eigen/Core>

#include <complex>
#include <string>
#include <vector>

namespace annulet {

struct NetworkPoint {
    double frequency_hz = 0;
    Eigen::MatrixXcd admittance_s, impedance_ohm, scattering;
};

/// Z and S from Y at one frequency; S by real port references (power waves reduce to this for real references).
NetworkPoint network_point(double frequency_hz, const Eigen::MatrixXcd& admittance_s,
                           const std::vector<double>& reference_ohm);

/// Of a reflection coefficient; magnitudes at or above 1 give infinite VSWR.
double return_loss_db(std::complex<double> reflection);   ///< positive for a passive port [Bird2009]
double vswr(std::complex<double> reflection);
double mismatch_loss_db(std::complex<double> reflection); ///< -10 log10(1 - |S11|^2)

enum class ResonanceKind { series, parallel, match, mode };

struct Resonance {
    std::string port;
    ResonanceKind kind = ResonanceKind::match;
    double frequency_hz = 0;
    double resistance_ohm = 0;
    double q = 0;              ///< Q_Z of [Yaghjian2005]
    double bandwidth_hz = 0;   ///< where VSWR is below the goal's around it; 0: nowhere
    double uncertainty_hz = 0; ///< half-width; 0: not estimated
};

/// One port's curve: `frequency_hz` ascending, `impedance_ohm` the input impedance with the other ports
/// terminated in their references.
struct PortCurve {
    std::string port;
    double reference_ohm = 50;
    std::vector<double> frequency_hz;
    std::vector<std::complex<double>> impedance_ohm;
};

/// S11 minima and X = 0 of both kinds, sharpened between grid points, ascending in frequency.
std::vector<Resonance> find_resonances(const PortCurve& curve, double goal_vswr);

}  // namespace annulet
