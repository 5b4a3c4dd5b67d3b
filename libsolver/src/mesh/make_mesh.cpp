#include <algorithm>
#include <annulet/mesh/mesh.hpp>
#include <cmath>
#include <limits>
#include <stdexcept>

#include "mesh/assemble.hpp"
#include "mesh/general_mesh.hpp"
#include "mesh/sheets.hpp"
#include "mesh/wire_contacts.hpp"
#include "mesh/wire_plan.hpp"

namespace annulet {

namespace {

constexpr double most_unknowns = 2e6;  // beyond, even the mesh alone is of no use

void check_options(const MeshOptions& options) {
    if (!(options.cells_per_wavelength > 0) || options.cells_across < 1 || options.cells_across > 1000 ||
        !(options.refine > 0) || !std::isfinite(options.refine) || !(options.edge_cell_fraction < 0.5) ||
        !(options.top_frequency_hz >= 0))
        throw std::invalid_argument("mesh options out of range");
}

}  // namespace

Mesh make_mesh(const Model& model, const MeshOptions& options) {
    check_options(options);
    MeshFaults faults;
    Layout layout = lay_out(model, faults);
    const WirePlan wires = plan_wires(model, options, faults);
    if (faults.empty()) check_wire_contacts(model, wires, layout.pieces, faults);
    faults.throw_if_any();
    const std::vector<GeneralPlane> planes = general_planes(model, layout.general, faults);
    const bool bare = std::all_of(planes.begin(), planes.end(), [](const GeneralPlane& p) { return p.metal.empty(); });
    if (layout.pieces.empty() && bare && model.wires.empty() && faults.empty())
        faults.add(model.metals[0].where, "there is no metal to mesh");
    faults.throw_if_any();
    std::vector<CrossGrid> across = cross_grids(layout, options);
    const AlongGrid along = along_grid(layout, options);
    const double unknowns = count_unknowns(layout, across, along, options.refine) + wires.cells(options.refine);
    const double bytes = matrix_bytes(unknowns);
    if (unknowns > most_unknowns || (options.memory_limit_bytes > 0 && bytes > options.memory_limit_bytes)) {
        const std::string limit = options.memory_limit_bytes > 0 && bytes > options.memory_limit_bytes
                                      ? fmt::format("{:.3g} GB are allowed", options.memory_limit_bytes / 1e9)
                                      : fmt::format("at most {:.0f} unknowns are taken", most_unknowns);
        throw NumericalError(
            fmt::format("the mesh of {:.0f} unknowns needs about {:.3g} GB, {}: take fewer cells per "
                        "wavelength or across, or a lower highest frequency",
                        unknowns, bytes / 1e9, limit));
    }
    refine_grids(across, options);
    Mesh mesh = assemble(model, layout, across, along, options.refine);
    add_general(mesh, model, layout.general, planes, options);
    add_wires(model, wires, options.refine, mesh);
    add_sheets(mesh, {model, layout, across, along, options}, faults);
    faults.throw_if_any();
    return mesh;
}

}  // namespace annulet
