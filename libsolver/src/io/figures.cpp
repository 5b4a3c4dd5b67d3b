#include "io/figures.hpp"

#include <annulet/io/sweep_result.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

namespace annulet {

CellCounts count_cells(const Mesh& mesh) {
    CellCounts counts;
    for (const auto& cell : mesh.cells) {
        if (cell.kind == CellKind::quadrilateral) ++counts.quadrilaterals;
        if (cell.kind == CellKind::triangle) ++counts.triangles;
        if (cell.kind == CellKind::segment) ++counts.segments;
    }
    for (const auto& sheet : mesh.sheets) counts.laminate += static_cast<int>(sheet.columns.size()) * sheet.layers();
    return counts;
}

const char* kind_name(ResonanceKind kind) {
    switch (kind) {
        case ResonanceKind::series:
            return "series";
        case ResonanceKind::parallel:
            return "parallel";
        case ResonanceKind::match:
            return "match";
        case ResonanceKind::mode:
            return "mode";
    }
    return "";
}

std::string engineering(double value, const std::string& unit, int digits) {
    constexpr std::array<const char*, 9> prefixes{"p", "n", "u", "m", "", "k", "M", "G", "T"};
    if (value == 0 || !std::isfinite(value)) return fmt::format("{} {}", value, unit);
    // Rounded first, so that 999.99 k becomes 1 M and not 1000 k.
    const double scale = std::pow(10.0, digits - 1 - std::floor(std::log10(std::abs(value))));
    const double rounded = std::round(value * scale) / scale;
    const int group = std::clamp(static_cast<int>(std::floor(std::log10(std::abs(rounded)) / 3 + 1e-12)), -4, 4);
    return fmt::format("{:.{}g} {}{}", value / std::pow(1000.0, group), digits,
                       prefixes[static_cast<std::size_t>(group + 4)], unit);
}

}  // namespace annulet
