// Can this be built and solved? Everything that is known without solving.
#pragma once

#include <annulet/geometry/fabrication.hpp>
#include <annulet/mesh/quality.hpp>

#include <string>
#include <vector>

namespace annulet {

/// A finding with the layer it was made on.
struct PlacedFinding {
    std::string layer;  ///< "metal at 0 mm", "laminate 'board'"
    RuleFinding rule;
};

struct CheckReport {
    double top_frequency_hz = 0;
    MeshQuality quality;
    int laminate_cells = 0;
    int laminate_unknowns = 0;  ///< of the full method: fluxes through the walls in each layer, one upright per column
    double matrix_memory_bytes = 0;
    double cells_per_wavelength = 0;      ///< of the longest edge, in free space
    std::vector<PlacedFinding> findings;  ///< against the rules of [fabrication]
    std::vector<std::string> electrical;  ///< metal that nothing feeds, ...
    bool passed() const { return findings.empty(); }
};

/// Rules of fabrication alone, without a mesh.
std::vector<PlacedFinding> rule_findings(const Model& model);

/// Options that a model asks for.
MeshOptions check_mesh_options(const Model& model);

/// Throws what make_mesh throws.
CheckReport check_model(const Model& model, const Mesh& mesh, double top_frequency_hz);

}  // namespace annulet
