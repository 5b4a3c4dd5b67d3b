// The centre line of a wire, measured by its arc length.
#pragma once

#include <annulet/model/model.hpp>

#include <vector>

namespace annulet {

class WireCurve {
public:
    /// A straight line, or `radius (cos(u sweep) e1 + sin(u sweep) e2) + u rise axis` from `centre`, u = 0 ... 1.
    struct Piece {
        bool straight = true;
        Vec3 from{0, 0, 0}, to{0, 0, 0};
        Vec3 centre{0, 0, 0}, e1{1, 0, 0}, e2{0, 1, 0}, axis{0, 0, 1};
        double radius_m = 0, sweep_rad = 0, rise_m = 0;
        double start_m = 0, length_m = 0;

        double end_m() const { return start_m + length_m; }
        /// At arc length s of the whole curve; curved pieces with their radius times `stretch`.
        Vec3 point(double s_m, double stretch = 1) const;
    };

    explicit WireCurve(const Wire& wire);

    double length_m() const { return pieces_.empty() ? 0 : pieces_.back().end_m(); }
    /// A circle, or a path whose end is its start.
    bool closed() const { return closed_; }
    const std::vector<Piece>& pieces() const { return pieces_; }
    std::size_t piece_at(double s_m) const;
    Vec3 point(double s_m) const { return pieces_[piece_at(s_m)].point(s_m); }
    /// Arc length of the point nearest to r.
    double nearest_m(const Vec3& r) const;

private:
    void add(Piece piece);
    void add_path(const WirePath& path);

    std::vector<Piece> pieces_;
    bool closed_ = false;
};

}  // namespace annulet
