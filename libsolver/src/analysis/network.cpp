#include <annulet/analysis/network.hpp>
#include <annulet/core/constants.hpp>
#include <annulet/core/diagnostics.hpp>
#include <annulet/model/model.hpp>

#include <fmt/format.h>
#include <Eigen/LU>

#include <cmath>
#include <limits>

namespace annulet {
namespace {

using Complex = std::complex<double>;
using Eigen::MatrixXcd;
using Eigen::VectorXd;

MatrixXcd identity_like(const MatrixXcd& matrix) {
    return MatrixXcd::Identity(matrix.rows(), matrix.cols());
}

void require_finite(const MatrixXcd& matrix, const char* what, double frequency_hz) {
    if (matrix.allFinite()) return;
    throw NumericalError(
        fmt::format("the {} matrix of the ports does not exist at {:.6g} MHz", what, frequency_hz / 1e6));
}

/// S = (1 + y)^-1 (1 - y) with y = sqrt(R) Y sqrt(R).
MatrixXcd scattering_of(const MatrixXcd& admittance_s, const VectorXd& root_reference) {
    const MatrixXcd y = root_reference.asDiagonal() * admittance_s * root_reference.asDiagonal();
    return (identity_like(y) + y).partialPivLu().solve(identity_like(y) - y);
}

/// Inverse of `scattering_of`: y = (1 + S)^-1 (1 - S); both factors commute.
MatrixXcd admittance_of(const MatrixXcd& scattering, const VectorXd& root_reference) {
    const VectorXd inverse = root_reference.cwiseInverse();
    const MatrixXcd y =
        (identity_like(scattering) + scattering).partialPivLu().solve(identity_like(scattering) - scattering);
    return inverse.asDiagonal() * y * inverse.asDiagonal();
}

VectorXd root(const std::vector<double>& reference_ohm) {
    return Eigen::Map<const VectorXd>(reference_ohm.data(), static_cast<Eigen::Index>(reference_ohm.size()))
        .cwiseSqrt();
}

}  // namespace

NetworkPoint network_point(double frequency_hz, const MatrixXcd& admittance_s,
                           const std::vector<double>& reference_ohm) {
    NetworkPoint point{frequency_hz, admittance_s, admittance_s.partialPivLu().inverse(),
                       scattering_of(admittance_s, root(reference_ohm))};
    require_finite(point.impedance_ohm, "impedance", frequency_hz);
    require_finite(point.scattering, "scattering", frequency_hz);
    return point;
}

MatrixXcd behind_lines(double frequency_hz, const MatrixXcd& admittance_s,
                       const std::vector<std::optional<FeedLine>>& lines) {
    std::vector<double> impedance_ohm;
    Eigen::VectorXcd shift(static_cast<Eigen::Index>(lines.size()));
    bool any = false;
    for (const auto& line : lines) {
        const double phase =
            line ? 2 * constants::pi * frequency_hz * line->length_m / (line->velocity_factor * constants::c0_m_per_s)
                 : 0.0;
        shift(static_cast<Eigen::Index>(impedance_ohm.size())) = std::polar(1.0, -phase);
        impedance_ohm.push_back(line ? line->impedance_ohm : 50.0);
        any = any || line.has_value();
    }
    if (!any) return admittance_s;
    // In the lines' own impedances a line only turns the phase of the waves.
    const VectorXd root_impedance = root(impedance_ohm);
    const MatrixXcd at_far_end = shift.asDiagonal() * scattering_of(admittance_s, root_impedance) * shift.asDiagonal();
    const MatrixXcd result = admittance_of(at_far_end, root_impedance);
    require_finite(result, "admittance", frequency_hz);
    return result;
}

Complex input_impedance_ohm(const MatrixXcd& admittance_s, const std::vector<double>& reference_ohm, int port) {
    // All other ports loaded by their conductance; the input admittance is the reciprocal of (Y + G)^-1's entry.
    MatrixXcd loaded = admittance_s;
    for (Eigen::Index i = 0; i < loaded.rows(); ++i)
        if (i != port) loaded(i, i) += 1 / reference_ohm[static_cast<std::size_t>(i)];
    return loaded.partialPivLu().inverse()(port, port);
}

Complex reflection(Complex impedance_ohm, double reference_ohm) {
    return (impedance_ohm - reference_ohm) / (impedance_ohm + reference_ohm);
}

double return_loss_db(Complex reflection) {
    return -20 * std::log10(std::abs(reflection));
}

double vswr(Complex reflection) {
    const double size = std::abs(reflection);
    return size < 1 ? (1 + size) / (1 - size) : std::numeric_limits<double>::infinity();
}

double mismatch_loss_db(Complex reflection) {
    return -10 * std::log10(1 - std::norm(reflection));
}

}  // namespace annulet
