// Eigenvalues of a nonlinear matrix function inside an ellipse by contour integrals [Beyn2012].
#pragma once

#include <Eigen/Core>

#include <complex>
#include <functional>
#include <vector>

namespace annulet {

/// T(s), n x n, analytic inside and around the contour.
using MatrixFunction = std::function<Eigen::MatrixXcd(std::complex<double>)>;
/// T(s)^-1 b for the given s and b (n x m).
using InverseFunction = std::function<Eigen::MatrixXcd(std::complex<double>, const Eigen::MatrixXcd&)>;

/// An ellipse with its axes along the real and the imaginary axis.
struct EllipseContour {
    std::complex<double> center;
    double semi_real;
    double semi_imag;
    /// True inside the ellipse enlarged by `factor`.
    bool contains(std::complex<double> s, double factor = 1) const;
};

/// T(s) v = 0 with |v|_2 = 1.
struct Eigenpair {
    std::complex<double> value;
    Eigen::VectorXcd vector;
    double residual;  ///< |T(s) v|_2 / mean |T|_F at the ends of the axes of the contour
};

struct ContourOptions {
    int nodes = 120;                   ///< of the trapezoidal rule around the contour
    int columns = 8;                   ///< random probing vectors at first; doubled while the rank does not settle
    int most_moments = 8;              ///< pairs of moments at most, >= 2; at most 4 while columns < n
    double rank_tolerance = 1e-9;      ///< singular values below this part of the largest are noise
    double residual_tolerance = 1e-9;  ///< pairs with a larger residual after polishing are dropped
    int newton_steps = 8;              ///< most steps of polishing; 0 leaves the values of the contour integral
    unsigned seed = 1;                 ///< of the probing vectors
};

/// All s with a singular T(s) inside `contour` and their vectors, ordered by imaginary, then real part. A multiple
/// eigenvalue with independent vectors comes once for each of them. Eigenvalues near the contour, inside or out, spoil
/// the accuracy of the integral (error as rho^-nodes, rho their distance ratio); polishing mends it.
/// Throws `NumericalError` if the rank does not settle within `most_moments`.
std::vector<Eigenpair> contour_eigenvalues(const MatrixFunction& matrix, const InverseFunction& inverse, int size,
                                           const EllipseContour& contour, const ContourOptions& options = {});

/// The same with T(s)^-1 by LU factorisation.
std::vector<Eigenpair> contour_eigenvalues(const MatrixFunction& matrix, int size, const EllipseContour& contour,
                                           const ContourOptions& options = {});

/// Newton's method on T(s) v = 0, c^H v = 1 with T' by central differences of step 1e-5 `scale`. Returns the pair of
/// least residual met, so never a worse one; the residual refers to the mean |T|_F at the distance `scale`.
Eigenpair polish_eigenpair(const MatrixFunction& matrix, Eigenpair start, double scale, int most_steps = 8);

}  // namespace annulet
