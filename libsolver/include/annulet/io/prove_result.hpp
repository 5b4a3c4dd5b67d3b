// The regression table for programs and for people.
#pragma once

#include <annulet/study/prove.hpp>

#include <string>

namespace annulet {

/// `version` of annulet. Cases with name, quantity, reference, computed, error, tolerance, source, judged, pass;
/// complex values as {"real", "imag"}.
std::string prove_json(const ProveReport& report, const std::string& version);

/// One line per case, failures marked and repeated at the end with their source.
std::string prove_table(const ProveReport& report);

}  // namespace annulet
