// The metal of one model as pieces of strip between fronts, before any cell is made.
#pragma once

#include <annulet/geometry/region.hpp>
#include <annulet/geometry/ribbon.hpp>
#include <annulet/model/model.hpp>
#include <functional>
#include <memory>
#include <string>
#include <vector>

#include "mesh/faults.hpp"
#include "mesh/track.hpp"

namespace annulet {

/// In strip widths: how near a front may come to a smooth joint of the centre line before that one is passed over.
inline constexpr double smooth_joint_margin = 0.02;

/// A line across a strip on which nodes must lie.
struct Front {
    enum class Kind { free_end, cut_end, joint, slit_side, sheet_edge };
    Kind kind = Kind::free_end;
    std::function<double(double)> s_m;  ///< of tau
    bool sharp = false;                 ///< a joint where the direction jumps
    int slit = -1;                      ///< index into Layout::slits
    bool enters_slit = false;           ///< the side met first along s
    double opening_m = 0;               ///< of a cut end: length of the cut along the centre line; 0: unknown
};

/// Metal of one strip between two ends, or all around. Block k lies between fronts k and k + 1 (cyclic on a loop).
struct Piece {
    int metal = -1;  ///< index into Model::metals
    std::shared_ptr<const Ribbon> ribbon;
    bool loop = false;
    std::vector<Front> fronts;    ///< in order of s; on a loop possibly none
    std::vector<int> block_slit;  ///< per block: slit whose gap it is, or -1
    std::vector<Loop> outline;    ///< counter-clockwise, the hole of a loop clockwise

    Vec2 front_point(bool at_end, double tau) const {
        return ribbon->point((at_end ? fronts.back() : fronts.front()).s_m(tau), tau);
    }
    /// Tag of edge i of outline[0] of a piece with ends: which side of the piece it is.
    enum class Side { start, right, end, left };
    std::vector<Side> outline_side;
    std::size_t blocks() const { return loop ? std::max<std::size_t>(fronts.size(), 1) : fronts.size() - 1; }
};

/// What makes a connected piece of metal general instead of strip-like: the mesher of cells along strips cannot
/// take it.
enum class ConductorKind { strip_like, general };

/// Divides the metals by the cuts listed after them. Metals at fault are left out of the result.
/// `general`: metals to be left out, or empty.
std::vector<Piece> lay_out_metal(const Model& model, MeshFaults& faults, const std::vector<bool>& general = {});

/// Strip-like shapes: ring, path, rectangle, sector with a hole.
ConductorKind classify(const Shape& shape);

/// What stands in the way of a slit: nothing, the end of the piece, or another slit (its index).
struct Obstacle {
    enum class Kind { none, end, slit };
    Kind kind = Kind::none;
    int slit = -1;
};

/// Puts a slit's two fronts into the piece, if nothing stands in the way.
Obstacle insert_slit(Piece& piece, const Track& track, int slit);

/// Puts a front in, where the edge of a sheet crosses the piece, unless it lies beyond the ends or on another front.
/// False if something stands in the way.
bool insert_sheet_edge(Piece& piece, std::function<double(double)> s_m);

/// Adds the joints of the centre line as fronts, drops smooth ones that another front crosses, and reports corners
/// that one crosses; sets block_slit and the outline. To be called when all slits are in.
void finish_fronts(Piece& piece, const Model& model, MeshFaults& faults);

/// Outline of a piece from its ends alone.
void set_outline(Piece& piece);

}  // namespace annulet
