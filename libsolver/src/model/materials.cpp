#include <annulet/core/constants.hpp>
#include <annulet/model/materials.hpp>

#include <algorithm>
#include <array>
#include <limits>

namespace annulet {

namespace {

// Pure metals: 1/resistivity at 293 K, from memory of the table "Electrical resistivity of pure metals" [CRC97].
// Alloys vary by several per cent with their composition.
constexpr auto materials = std::to_array<Material>({
    {"perfect", std::numeric_limits<double>::infinity(), "no loss"},
    {"copper", constants::copper_s_per_m, "annealed copper standard [IACS1914]"},
    {"silver", 1 / 1.587e-8, "[CRC97]"},
    {"gold", 1 / 2.214e-8, "[CRC97]"},
    {"aluminium", 1 / 2.650e-8, "[CRC97]"},
    {"zinc", 1 / 5.90e-8, "[CRC97]"},
    {"tungsten", 1 / 5.28e-8, "[CRC97]"},
    {"tin", 1 / 11.5e-8, "[CRC97]"},
    {"brass", 1.59e7, "63 % copper, common practice, no source"},
    {"phosphor bronze", 0.9e7, "common practice, no source"},
    {"solder", 0.7e7, "tin-lead or tin-silver-copper, common practice, no source"},
    {"stainless steel", 1.4e6, "austenitic, not magnetic, common practice, no source"},
});

}  // namespace

std::optional<Material> find_material(std::string_view name) {
    const auto found =
        std::find_if(materials.begin(), materials.end(), [&](const Material& m) { return m.name == name; });
    if (found == materials.end()) return std::nullopt;
    return *found;
}

std::vector<std::string> material_names() {
    std::vector<std::string> names;
    for (const Material& material : materials) names.emplace_back(material.name);
    return names;
}

}  // namespace annulet
