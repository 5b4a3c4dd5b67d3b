#include <annulet/analysis/far_field.hpp>

#include <annulet/core/constants.hpp>
#include <annulet/numerics/quadrature.hpp>

#include <cmath>

namespace annulet {

namespace {

/// J0(k a sin theta) by its series: mean phase of a ring of radius a about the axis along which the moment points.
double tube_factor(const CurrentSamples& currents, Eigen::Index p, const Vec3& r, double k_per_m) {
    const double length2 = currents.moment_a_m.col(p).squaredNorm();
    if (length2 == 0) return 1;
    const std::complex<double> along = (r.transpose() * currents.moment_a_m.col(p)).value();
    const double sin2 = 1 - std::norm(along) / length2;
    const double x2 = std::pow(k_per_m * currents.radius_m[p], 2) * sin2;
    return 1 - x2 / 4 + x2 * x2 / 64;
}

}  // namespace

Eigen::Matrix3Xcd radiation_vectors(const CurrentSamples& currents, double k_per_m,
                                    const Eigen::MatrixX3d& directions) {
    Eigen::Matrix3Xcd out(3, directions.rows());
#pragma omp parallel for schedule(static)
    for (Eigen::Index i = 0; i < directions.rows(); ++i) {
        const Vec3 r = directions.row(i).transpose();
        const Eigen::ArrayXd phase = k_per_m * (r.transpose() * currents.position_m).transpose().array();
        Eigen::VectorXcd factor(phase.size());
        factor.real() = phase.cos();
        factor.imag() = phase.sin();
        for (Eigen::Index p = 0; p < currents.radius_m.size(); ++p)
            if (currents.radius_m[p] > 0) factor[p] *= tube_factor(currents, p, r, k_per_m);
        const Eigen::Vector3cd n = currents.moment_a_m * factor;
        out.col(i) = n - r * (r.transpose() * n);
    }
    return out;
}

double radiated_power_w(const Operator& op, const Eigen::VectorXcd& coefficients, double frequency_hz) {
    const double k = 2 * constants::pi * frequency_hz / constants::c0_m_per_s;
    const CurrentSamples currents = sample_currents(op, coefficients);
    const Vec3 low = currents.position_m.rowwise().minCoeff(), high = currents.position_m.rowwise().maxCoeff();
    // Spherical harmonics of the pattern die out beyond degree k a (a: half the diagonal); |N|^2 has twice that.
    const double size = 0.5 * k * (high - low).norm();
    const SphereRule sphere = sphere_rule(static_cast<int>(std::ceil(size)) + 10);
    Eigen::Matrix3Xd centred = currents.position_m.colwise() - 0.5 * (low + high);
    const CurrentSamples shifted{centred, currents.moment_a_m, {}, currents.radius_m, {}};
    const Eigen::Matrix3Xcd n = radiation_vectors(shifted, k, sphere.directions);
    const double integral = n.colwise().squaredNorm().transpose().dot(sphere.weights);
    const double half = op.mesh().ground_plane_m ? 0.5 : 1.0;  // images make the two halves alike
    return half * constants::eta0_ohm * k * k / (32 * constants::pi * constants::pi) * integral;
}

}  // namespace annulet
