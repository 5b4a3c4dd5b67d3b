// The regression table: what this build computes against results from outside the project.
#pragma once

#include <annulet/core/progress.hpp>

#include <complex>
#include <string>
#include <vector>

namespace annulet {

/// One line of the table. Real quantities have no imaginary part and `is_complex` false.
struct ProveCase {
    std::string name;
    std::string quantity;  ///< with its unit: "impedance_ohm", "resonance_wavelengths", ...
    bool is_complex = false;
    std::complex<double> reference;
    std::complex<double> computed;
    double scale = 0;  ///< what the error is relative to: |reference|, or the largest of its kind
    double tolerance = 0;
    std::string source;  ///< of the reference
    bool judged = true;  ///< false: shown only; `why_not` says why
    std::string why_not;

    double error() const { return std::abs(computed - reference) / scale; }
    bool pass() const { return !judged || error() <= tolerance; }
};

struct ProveReport {
    std::vector<ProveCase> cases;
    double total_s = 0;

    bool pass() const;
    int judged() const;
    int failed() const;
};

/// Computes all cases, several at a time. The table is the same for any number of threads to rounding.
/// Throws NumericalError, Cancelled.
ProveReport prove(Progress* progress = nullptr);

}  // namespace annulet
