// What a check found, for people and for programs.
#pragma once

#include <annulet/io/sweep_result.hpp>
#include <annulet/study/check.hpp>

#include <string>

namespace annulet {

std::string check_text(const Model& model, const CheckReport& report);
std::string check_json(const Model& model, const CheckReport& report, const ResultOrigin& origin);
/// "slot of 0.5 mm at (54, 0) mm, below the 0.8 mm allowed, on metal at 0 mm".
std::string finding_text(const PlacedFinding& finding);

}  // namespace annulet
