// The groups of cases of `prove`, each a list of independent computations.
#pragma once

#include <annulet/study/prove.hpp>

#include <functional>
#include <vector>

namespace annulet {

using ProveTask = std::function<std::vector<ProveCase>()>;

std::vector<ProveTask> dipole_tasks();      ///< tube dipoles and their resonances
std::vector<ProveTask> loop_tasks();        ///< circular wire loops, inductances of wire
std::vector<ProveTask> coupling_tasks();    ///< mutual impedances, monopoles, folded dipoles
std::vector<ProveTask> flat_metal_tasks();  ///< plates, annuli, strip rings

ProveCase real_case(std::string name, std::string quantity, double reference, double computed, double tolerance,
                    std::string source);
ProveCase complex_case(std::string name, std::string quantity, std::complex<double> reference,
                       std::complex<double> computed, double tolerance, std::string source);
ProveCase shown_only(ProveCase shown, std::string why_not);

}  // namespace annulet
