// Quadrature rules on lines, quadrilaterals, triangles and the sphere, and interpolation in Chebyshev nodes.
#pragma once

#include <Eigen/Core>

namespace annulet {

/// n nodes and n weights.
struct LineRule {
    Eigen::VectorXd nodes;
    Eigen::VectorXd weights;
};

/// Gauss-Legendre rule of `n` >= 1 points on [a, b]; exact for degree 2n - 1. Nodes ascend.
LineRule gauss_legendre(int n, double a = -1, double b = 1);

/// Points of the unit square, n x 2, weights of sum 1.
struct SquareRule {
    Eigen::MatrixX2d points;
    Eigen::VectorXd weights;
};

/// Product of Gauss-Legendre rules with `n_s` points along the first and `n_t` along the second coordinate.
SquareRule gauss_square(int n_s, int n_t);

/// Barycentric coordinates, n x 3, weights of sum 1 (to be multiplied by the area).
struct TriangleRule {
    Eigen::MatrixX3d points;
    Eigen::VectorXd weights;
};

/// Fully symmetric rule with positive weights, exact at least for polynomials of `degree` (0 to 8), of
/// 1 point [Strang1973], 3 and 6 points [Strang1973], 7 points [Radon1948] or 16 points [Dunavant1985] for degree
/// 1, 2, 4, 5 and 8. Throws `std::invalid_argument` for another degree.
TriangleRule triangle_rule(int degree);

/// Unit vectors, n x 3, weights of sum 4 pi.
struct SphereRule {
    Eigen::MatrixX3d directions;
    Eigen::VectorXd weights;
};

/// Gauss-Legendre in cos(theta) with `n` points times the trapezoidal rule in phi with 2n points: exact for
/// spherical harmonics up to degree 2n - 1.
SphereRule sphere_rule(int n);

/// Chebyshev nodes of the first kind, n >= 1 of them, ascending in [a, b].
Eigen::VectorXd chebyshev_nodes(int n, double a = -1, double b = 1);

/// Lagrange interpolation in the barycentric form [Berrut2004].
class Interpolation {
public:
    /// Any distinct `nodes` (n); the weights are scaled so that they do not overflow.
    explicit Interpolation(Eigen::VectorXd nodes);

    const Eigen::VectorXd& nodes() const { return nodes_; }
    /// Values at `x` of the n Lagrange polynomials: p(x) = sum_j result_j f(node_j).
    Eigen::VectorXd basis(double x) const;

private:
    Eigen::VectorXd nodes_;
    Eigen::VectorXd weights_;
};

}  // namespace annulet
