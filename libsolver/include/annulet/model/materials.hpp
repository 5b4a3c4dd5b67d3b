// Conductivities by name.
#pragma once

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace annulet {

struct Material {
    std::string_view name;
    double conductivity_s_per_m;  ///< at 20 degrees Celsius; infinite: perfect
    std::string_view source;
};

std::optional<Material> find_material(std::string_view name);
std::vector<std::string> material_names();

}  // namespace annulet
