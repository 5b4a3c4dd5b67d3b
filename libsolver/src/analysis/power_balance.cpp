#include <annulet/analysis/far_field.hpp>
#include <annulet/analysis/power_balance.hpp>
#include <annulet/core/constants.hpp>

namespace annulet {

PowerBalance power_balance(const Operator& op, const Eigen::VectorXcd& currents_a, std::complex<double> admittance_s,
                           double frequency_hz) {
    PowerBalance balance{frequency_hz, 0.5 * admittance_s.real(), radiated_power_w(op, currents_a, frequency_hz), 0};
    const std::complex<double> s(0, 2 * constants::pi * frequency_hz);
    for (const ExactTerm& term : op.exact_terms()) {
        const Eigen::VectorXcd weighted = term.matrix.cast<std::complex<double>>() * currents_a;
        balance.dissipated_w += 0.5 * term.factor(s).real() * currents_a.dot(weighted).real();
    }
    return balance;
}

}  // namespace annulet
