// Ports and lumped parts on the metal: bridges over real gaps, slits through continuous metal.
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <string>
#include <variant>
#include <vector>

#include "mesh/faults.hpp"
#include "mesh/layout.hpp"

namespace annulet {

/// A port or lumped part as drawn: ports first, then parts.
struct Place {
    std::string what;  ///< "port 'feed'"
    Placement placement;
    Position where;
};
std::vector<Place> places_of(const Model& model);

/// Part of the end of a piece, from tau_a to tau_b.
struct Landing {
    int piece = -1;
    bool at_end = false;
    double tau_a = -1;
    double tau_b = 1;
};

/// Cells from one landing to the other; seen along `direction`, tau_a lies on the right.
struct Span {
    int place = -1;
    Landing from, to;
    Vec2 direction{1, 0};
    double length_m = 0;
    double width_m = 0;
    bool full_width = false;
};

/// Two ends that are one line of nodes.
struct Join {
    Landing from, to;
};

struct SlitGap {
    int place = -1;
    Vec2 direction{1, 0};  ///< from the right of the drawn line to its left
    double length_m = 0;
};

struct Layout {
    std::vector<bool> general;  ///< per metal: left to the mesher of triangles
    std::vector<Piece> pieces;
    std::vector<Span> spans;
    std::vector<SlitGap> slits;
    std::vector<Join> joins;
    std::vector<Join> aligned;  ///< ends that face each other over bare sheet: their node lines correspond
};

/// Everything on the metal, faults collected.
Layout lay_out(const Model& model, MeshFaults& faults);

/// Ends of pieces that meet over their full width.
std::vector<Join> find_joins(const Model& model, const std::vector<Piece>& pieces);

/// Pieces that overlap or touch elsewhere than at joined ends; gaps that touch or overlap.
void check_contacts(const Model& model, const Layout& layout, MeshFaults& faults);

/// The four corners of a span, counter-clockwise.
Loop corners(const Layout& layout, const Span& span);

/// The pieces of one plane along a straight line: where it runs over metal and where not.
class Survey {
public:
    struct Crossing {
        double x_m = 0;  ///< from the start of the line
        int piece = -1;
        Piece::Side side = Piece::Side::right;
    };
    struct Stretch {
        double from_m = 0;
        double to_m = 0;
        int piece = -1;  ///< -1: no metal
        const Crossing* before = nullptr;
        const Crossing* after = nullptr;
    };
    Survey(const Model& model, const std::vector<Piece>& pieces, double plane_m, const Vec2& from, const Vec2& to,
           double beyond_m);
    bool any_metal() const { return !on_plane_.empty(); }
    const std::vector<Stretch>& stretches() const { return stretches_; }
    /// Piece that holds `p`, or -1.
    int piece_at(const Vec2& p) const;
    double distance_to_edge(const Vec2& p) const;

private:
    void cross_piece(int piece, const Vec2& from, const Vec2& unit, double start_m, double stop_m);

    const std::vector<Piece>& pieces_;
    std::vector<int> on_plane_;
    std::vector<Crossing> crossings_;
    std::vector<Stretch> stretches_;
};

}  // namespace annulet
