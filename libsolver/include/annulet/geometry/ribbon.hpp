// A strip as a map from (s, tau) to the plane: s along its centre line, tau = -1 ... 1 from its right edge to
// its left one.
#pragma once

#include <annulet/geometry/curve.hpp>

#include <optional>
#include <string>
#include <vector>

namespace annulet {

class Ribbon {
public:
    /// A point of the strip; on arcs also in polar form about the centre of the arc.
    struct Sample {
        Vec2 point{0, 0};
        bool on_arc = false;
        Vec2 centre{0, 0};
        double angle_rad = 0;
        double radius_m = 0;
    };

    explicit Ribbon(const Ring& ring);
    explicit Ribbon(const StripPath& path);

    const Curve& centre() const { return centre_; }
    double length_m() const { return centre_.length_m(); }
    bool closed() const { return closed_; }
    /// False for a ring: its start is a place like any other.
    bool has_seam() const { return has_seam_; }
    double width_m(double s_m) const;
    double widest_m() const { return std::max(width_start_m_, width_end_m_); }
    double narrowest_m() const { return std::min(width_start_m_, width_end_m_); }
    /// True where the direction of the centre line jumps; joint 0 is the start, joint n the end of piece n - 1.
    bool kinked(std::size_t joint) const { return kinked_[joint]; }

    /// `s_m` is periodic on a closed strip, clamped to the ends on an open one.
    /// Lines of constant tau run straight between mitres on straight pieces, on circles on arcs.
    Sample sample(double s_m, double tau) const;
    /// At fraction `u` of one piece of the centre line; beyond 0 ... 1 the piece is continued.
    Sample sample_on(std::size_t piece, double u, double tau) const;
    Vec2 point(double s_m, double tau) const { return sample(s_m, tau).point; }
    /// Bound of |d point / d s| on a piece.
    double speed(std::size_t piece, double tau) const;

private:
    struct Polar {
        double angle_rad;
        double radius_m;
    };
    Vec2 joint_point(std::size_t joint, double tau) const;
    Polar arc_end(std::size_t piece, bool at_end, double tau) const;
    void set_mitres();

    Curve centre_;
    double width_start_m_ = 0;
    double width_end_m_ = 0;
    bool closed_ = false;
    bool has_seam_ = true;
    std::vector<Vec2> mitre_;  ///< per joint: from the centre line to the left edge, per half width
    std::vector<bool> kinked_;
};

/// The strip that a shape is, if it is one: ring, path, rectangle (along its longer side), sector with a hole.
/// The shape must be without flaw.
std::optional<Ribbon> ribbon_of(const Shape& shape);

/// What is wrong with the shape by itself (no length, tighter than its width, not finite ...), worded to follow
/// "metal 'name' ", or empty.
std::string flaw(const Shape& shape);

}  // namespace annulet
