#include "mesh/wire_contacts.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

namespace annulet {

namespace {

/// In sums of the radii: how far from a joint two wires may overlap, as they do where they meet at an angle.
constexpr double joint_reach = 4;

/// A straight bit of a wire, short against its bends.
struct Bit {
    std::size_t wire = 0;  ///< index into WirePlan::wires
    double from_m = 0, to_m = 0;
    Vec3 from{0, 0, 0}, to{0, 0, 0};
};

struct Approach {
    double distance_m = 0;
    double s = 0, t = 0;  ///< fractions along the two bits
};

/// Nearest points of two segments, the one parameter clamped, then the other.
Approach nearest_points(const Bit& p, const Bit& q) {
    const Vec3 d1 = p.to - p.from, d2 = q.to - q.from, r = p.from - q.from;
    const double a = d1.squaredNorm(), e = d2.squaredNorm(), f = d2.dot(r), c = d1.dot(r), b = d1.dot(d2);
    const double det = a * e - b * b;
    double s = det > 1e-12 * a * e ? std::clamp((b * f - c * e) / det, 0.0, 1.0) : 0.0;
    double t = (b * s + f) / e;
    if (t < 0 || t > 1) {
        t = std::clamp(t, 0.0, 1.0);
        s = std::clamp((b * t - c) / a, 0.0, 1.0);
    }
    return {(p.from + s * d1 - q.from - t * d2).norm(), s, t};
}

class ContactCheck {
public:
    ContactCheck(const Model& model, const WirePlan& plan, const std::vector<Piece>& metal, MeshFaults& faults)
        : model_(model), plan_(plan), metal_(metal), faults_(faults) {
        for (std::size_t w = 0; w < plan.wires.size(); ++w) cut_up(w);
    }

    void check() {
        for (std::size_t w = 0; w < plan_.wires.size(); ++w) {
            check_ground(w);
            check_metal(w);
        }
        std::vector<std::pair<std::size_t, std::size_t>> told;
        for (std::size_t i = 0; i < bits_.size(); ++i)
            for (std::size_t j = i + 1; j < bits_.size(); ++j) {
                const std::pair pair(bits_[i].wire, bits_[j].wire);
                if (!touching(bits_[i], bits_[j]) || std::find(told.begin(), told.end(), pair) != told.end()) continue;
                told.push_back(pair);
                report(bits_[i], bits_[j]);
            }
    }

private:
    const Wire& wire(std::size_t w) const { return model_.wires[static_cast<std::size_t>(plan_.wires[w].wire)]; }
    const WireCurve& curve(std::size_t w) const { return plan_.wires[w].curve; }

    void cut_up(std::size_t w) {
        for (const auto& piece : curve(w).pieces()) {
            const int n = piece.straight ? 1 : 2 + static_cast<int>(std::abs(piece.sweep_rad) * 8);
            for (int i = 0; i < n; ++i) {
                const double from = piece.start_m + piece.length_m * i / n;
                const double to = piece.start_m + piece.length_m * (i + 1) / n;
                bits_.push_back({w, from, to, piece.point(from), piece.point(to)});
            }
        }
    }

    double reach(const Bit& p, const Bit& q) const { return wire(p.wire).radius_m + wire(q.wire).radius_m; }

    bool near_common_joint(const Bit& p, const Bit& q, const Approach& a) const {
        const Vec3 on_p = p.from + a.s * (p.to - p.from), on_q = q.from + a.t * (q.to - q.from);
        return std::any_of(plan_.breaks.begin(), plan_.breaks.end(), [&](const WireBreak& b) {
            return b.joint && (b.position - on_p).norm() < joint_reach * reach(p, q) &&
                   (b.position - on_q).norm() < joint_reach * reach(p, q);
        });
    }

    bool near_along(const Bit& p, const Bit& q, const Approach& a) const {
        if (p.wire != q.wire) return false;
        const double s = p.from_m + a.s * (p.to_m - p.from_m), t = q.from_m + a.t * (q.to_m - q.from_m);
        const double length = curve(p.wire).length_m(), apart = std::abs(s - t);
        return (curve(p.wire).closed() ? std::min(apart, length - apart) : apart) < joint_reach * reach(p, q);
    }

    bool touching(const Bit& p, const Bit& q) const {
        const double halves = 0.5 * ((p.to - p.from).norm() + (q.to - q.from).norm());
        if ((0.5 * (p.from + p.to - q.from - q.to)).norm() > halves + reach(p, q)) return false;
        const Approach a = nearest_points(p, q);
        return a.distance_m < reach(p, q) && !near_along(p, q, a) && !near_common_joint(p, q, a);
    }

    void report(const Bit& p, const Bit& q) {
        const Approach a = nearest_points(p, q);
        const Vec3 r = p.from + a.s * (p.to - p.from);
        const Wire &first = wire(p.wire), &second = wire(q.wire);
        const std::string place = fmt::format("({:.4g}, {:.4g}, {:.4g}) mm", r.x() * 1e3, r.y() * 1e3, r.z() * 1e3);
        faults_.add(
            second.where,
            p.wire == q.wire
                ? fmt::format("wire '{}' touches itself near {}: its axis passes itself at {}", first.name, place,
                              mm(a.distance_m))
                : fmt::format("wire '{}' touches wire '{}' (line {}) near {} without a joint: the axes are {} "
                              "apart, the radii add up to {}",
                              second.name, first.name, first.where.line, place, mm(a.distance_m), mm(reach(p, q))),
            "let an end of one lie on the axis of the other, or draw the same point in both, or move them apart");
    }

    void check_ground(std::size_t w) {
        if (!model_.ground_plane_m) return;
        const double plane = *model_.ground_plane_m, radius = wire(w).radius_m;
        for (const Bit& bit : bits_) {
            if (bit.wire != w) continue;
            const double lowest = std::min(bit.from.z(), bit.to.z()) - plane;
            const double middle = 0.5 * (bit.from.z() + bit.to.z()) - plane;
            const bool level = std::abs(bit.to.z() - bit.from.z()) < 0.5 * (bit.to - bit.from).norm();
            if (lowest < -1e-9 - 1e-3 * radius)
                faults_.add(wire(w).where,
                            fmt::format("wire '{}' reaches {} below the ground plane", wire(w).name, mm(-lowest)),
                            "move it up, or lower the plane of [ground]");
            else if (level && middle < radius)
                faults_.add(wire(w).where,
                            fmt::format("wire '{}' of radius {} lies in the ground plane: its axis is {} above it",
                                        wire(w).name, mm(radius), mm(middle)),
                            "raise it by more than its radius");
            else
                continue;
            return;
        }
    }

    void check_metal(std::size_t w) {
        for (const Bit& bit : bits_)
            for (const Piece& piece : metal_) {
                if (bit.wire != w || !touches(bit, piece)) continue;
                const std::string& name = model_.metals[static_cast<std::size_t>(piece.metal)].name;
                faults_.add(wire(w).where,
                            fmt::format("wire '{}' touches metal '{}': attaching a wire to metal is not yet possible",
                                        wire(w).name, name),
                            "keep the wire clear of the metal by more than its radius");
                return;
            }
    }

    bool touches(const Bit& bit, const Piece& piece) const {
        const double radius = wire(bit.wire).radius_m;
        const double plane = model_.metals[static_cast<std::size_t>(piece.metal)].plane_m;
        const double low = std::min(bit.from.z(), bit.to.z()) - plane,
                     high = std::max(bit.from.z(), bit.to.z()) - plane;
        if (low > radius || high < -radius) return false;
        const int samples = 2 + static_cast<int>(std::min(1000.0, (bit.to - bit.from).norm() / radius));
        for (int i = 0; i <= samples; ++i) {
            const Vec3 r = bit.from + (bit.to - bit.from) * i / samples;
            if (std::abs(r.z() - plane) > radius) continue;
            const Vec2 p = r.head<2>();
            if (inside(piece.outline, p) || distance_to(piece.outline, p) < radius) return true;
        }
        return false;
    }

    const Model& model_;
    const WirePlan& plan_;
    const std::vector<Piece>& metal_;
    MeshFaults& faults_;
    std::vector<Bit> bits_;
};

}  // namespace

void check_wire_contacts(const Model& model, const WirePlan& plan, const std::vector<Piece>& metal,
                         MeshFaults& faults) {
    ContactCheck(model, plan, metal, faults).check();
}

}  // namespace annulet
