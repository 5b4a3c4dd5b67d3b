#include "mesh/fill.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <map>

#include "mesh/triangulate.hpp"

namespace annulet {

namespace {

constexpr double room_share = 0.4;      // of the way to the next edge that layers may take
constexpr double steepest_slope = 0.5;  // of the height of layers along the edge
constexpr double widest_mitre = 1.6;
constexpr double worthwhile = 0.6;      // least height of layers, in first layers
constexpr double shortest_front = 0.4;  // of the edge it belongs to
constexpr int most_repairs = 12;

struct Corner {
    Vec2 at{0, 0};
    Vec2 inward{0, 0};  ///< along the bisector; its length reaches the parallel of both edges at distance 1
    double first_m = 0;
    double height_m = 0;
    double shares_edges_m = 0;  ///< mean length of the two edges
    double turn_rad = 0;
    bool ends_in_next = false;    ///< its last layer shares the point of the next corner's
    bool ends_in_before = false;  ///< or of the corner before
};

using Ring2 = std::vector<Corner>;

double hit(const Vec2& from, const Vec2& along, const Vec2& a, const Vec2& b) {
    const Vec2 edge = b - a;
    const double turn = cross(along, edge);
    if (std::abs(turn) < 1e-14 * edge.norm()) return std::numeric_limits<double>::infinity();
    const double t = cross(a - from, edge) / turn, u = cross(a - from, along) / turn;
    return t > 1e-6 * edge.norm() && u >= -1e-9 && u <= 1 + 1e-9 ? t : std::numeric_limits<double>::infinity();
}

bool crossing(const Vec2& a, const Vec2& b, const Vec2& c, const Vec2& d) {
    if (std::max(a.x(), b.x()) < std::min(c.x(), d.x()) || std::max(c.x(), d.x()) < std::min(a.x(), b.x()) ||
        std::max(a.y(), b.y()) < std::min(c.y(), d.y()) || std::max(c.y(), d.y()) < std::min(a.y(), b.y()))
        return false;
    return (cross(b - a, c - a) > 0) != (cross(b - a, d - a) > 0) &&
           (cross(d - c, a - c) > 0) != (cross(d - c, b - c) > 0);
}

// Smallest of h_max and own + growth * distance over all sources, which are kept by squares as wide as their reach.
class SizeMap {
public:
    SizeMap(const std::vector<std::pair<Vec2, double>>& sources, double growth, double h_max_m)
        : growth_(growth), h_max_m_(h_max_m), reach_m_(h_max_m / growth) {
        for (const auto& source : sources)
            if (source.second < h_max_m) squares_[square(source.first)].push_back(source);
    }

    double at(const Vec2& p) const {
        double h = h_max_m_;
        const auto [x, y] = square(p);
        for (long long i = x - 1; i <= x + 1; ++i)
            for (long long j = y - 1; j <= y + 1; ++j)
                if (const auto found = squares_.find({i, j}); found != squares_.end())
                    for (const auto& [centre, own] : found->second)
                        h = std::min(h, own + growth_ * (p - centre).norm());
        return h;
    }

private:
    std::pair<long long, long long> square(const Vec2& p) const {
        return {static_cast<long long>(std::floor(p.x() / reach_m_)),
                static_cast<long long>(std::floor(p.y() / reach_m_))};
    }

    double growth_, h_max_m_, reach_m_;
    std::map<std::pair<long long, long long>, std::vector<std::pair<Vec2, double>>> squares_;
};

class Filler {
public:
    explicit Filler(const FillRequest& request) : request_(request) {
        for (std::size_t l = 0; l < request.loops.size(); ++l) rings_.push_back(ring(l));
        for (Ring2& corners : rings_) set_heights(corners);
    }

    FilledRegion made() {
        for (int k = 0; k < most_repairs && repair(k + 2 >= most_repairs); ++k) {
        }
        for (Ring2& corners : rings_) merge_fronts(corners);
        std::vector<std::vector<std::vector<int>>> lines;  // loop, layer, corner
        for (const Ring2& corners : rings_) lines.push_back(add_first(corners));
        for (std::size_t l = 0; l < rings_.size(); ++l) add_layers(rings_[l], lines[l]);
        add_triangles(lines);
        return std::move(filled_);
    }

private:
    Ring2 ring(std::size_t l) const {
        const Loop& loop = request_.loops[l];
        const std::size_t n = loop.size();
        Ring2 corners(n);
        for (std::size_t i = 0; i < n; ++i) {
            const Vec2 in = loop[i] - loop[(i + n - 1) % n], out = loop[(i + 1) % n] - loop[i];
            const Vec2 normal_in = left_of(in.normalized()), normal_out = left_of(out.normalized());
            Corner& corner = corners[i];
            corner.at = loop[i];
            corner.first_m = request_.first_layer_m[l][i];
            corner.shares_edges_m = 0.5 * (in.norm() + out.norm());
            corner.turn_rad = std::abs(std::atan2(cross(in, out), in.dot(out)));
            const double cosine2 = 1 + normal_in.dot(normal_out);
            corner.inward = cosine2 > 1e-6 ? Vec2((normal_in + normal_out) / cosine2) : left_of(normal_in);
            // Outside a sharp corner the layers are rounded off.
            if (cross(in, out) < 0 && corner.inward.norm() > widest_mitre)
                corner.inward *= widest_mitre / corner.inward.norm();
        }
        return corners;
    }

    double room(const Vec2& from, const Vec2& along) const {
        double nearest = std::numeric_limits<double>::infinity();
        for (const Loop& loop : request_.loops)
            for (std::size_t i = 0; i < loop.size(); ++i) {
                const Vec2 &a = loop[i], &b = loop[(i + 1) % loop.size()];
                if ((a - from).squaredNorm() == 0 || (b - from).squaredNorm() == 0) continue;
                nearest = std::min(nearest, hit(from, along, a, b));
            }
        return nearest;
    }

    // Layers grow until they are about as thick as the edges are long.
    int layers_wanted(const Ring2& corners) const {
        double first = std::numeric_limits<double>::infinity(), longest = 0;
        for (const Corner& corner : corners)
            if (corner.first_m > 0) {
                first = std::min(first, corner.first_m);
                longest = std::max(longest, corner.shares_edges_m);
            }
        if (longest == 0 || request_.most_layers == 0) return 0;
        const double g = request_.growth;
        const double count = std::log1p(g * std::min(longest * request_.refine, request_.h_max_m) * 0.7 / first) / g;
        return std::clamp(static_cast<int>(std::lround(count)), 1, request_.most_layers);
    }

    void set_heights(Ring2& corners) {
        const int layers = layers_wanted(corners);
        const std::size_t n = corners.size();
        layers_.push_back(layers);
        if (layers == 0) return;
        const double stretch = std::expm1(request_.growth * layers) / request_.growth;
        for (Corner& corner : corners)
            if (corner.first_m > 0)
                corner.height_m = std::min(corner.first_m * stretch, room_share * room(corner.at, corner.inward));
        for (std::size_t i = 0; i < n; ++i) {
            Corner &a = corners[i], &b = corners[(i + 1) % n];
            const double half = room_share * room(0.5 * (a.at + b.at), left_of((b.at - a.at).normalized()));
            a.height_m = std::min(a.height_m, half);
            b.height_m = std::min(b.height_m, half);
        }
        for (int pass = 0; pass < 2; ++pass)
            for (std::size_t step = 0; step < 2 * n; ++step) {
                const std::size_t i = pass == 0 ? step % n : 2 * n - 1 - step;
                Corner &a = corners[i % n], &b = corners[(i + 1) % n];
                const double rise = steepest_slope * (b.at - a.at).norm();
                if (a.first_m > 0) a.height_m = std::min(a.height_m, b.height_m + rise);
                if (b.first_m > 0) b.height_m = std::min(b.height_m, a.height_m + rise);
            }
        for (Corner& corner : corners)
            if (corner.height_m < worthwhile * corner.first_m) corner.height_m = 0;
    }

    static Vec2 front(const Corner& corner) { return corner.at + corner.height_m * corner.inward; }

    // Takes layers back where cells fold over or fronts cross; true if any was.
    bool repair(bool give_up) {
        std::vector<Corner*> bad;
        struct Segment {
            Vec2 a, b;
            Corner *from, *to;
        };
        std::vector<Segment> fronts;
        for (Ring2& corners : rings_)
            for (std::size_t i = 0; i < corners.size(); ++i) {
                Corner &a = corners[i], &b = corners[(i + 1) % corners.size()];
                fronts.push_back({front(a), front(b), &a, &b});
                if (cross(b.at - a.at, front(b) - a.at) < 0 || cross(b.at - a.at, front(a) - a.at) < 0 ||
                    cross(front(b) - front(a), b.at - front(a)) > 0 || cross(front(b) - front(a), a.at - front(a)) > 0)
                    bad.insert(bad.end(), {&a, &b});
            }
        std::sort(fronts.begin(), fronts.end(), [](const Segment& p, const Segment& q) {
            return std::min(p.a.x(), p.b.x()) < std::min(q.a.x(), q.b.x());
        });
        for (std::size_t i = 0; i < fronts.size(); ++i)
            for (std::size_t j = i + 1; j < fronts.size(); ++j) {
                const Segment &p = fronts[i], &q = fronts[j];
                if (std::min(q.a.x(), q.b.x()) > std::max(p.a.x(), p.b.x())) break;
                if (p.from == q.to || p.to == q.from) continue;
                if (crossing(p.a, p.b, q.a, q.b)) bad.insert(bad.end(), {p.from, p.to, q.from, q.to});
            }
        bool changed = false;
        for (Corner* corner : bad) {
            changed = changed || corner->height_m > 0;
            corner->height_m = give_up || corner->height_m < worthwhile * corner->first_m ? 0 : 0.5 * corner->height_m;
        }
        return changed;
    }

    // Around corners the front may come out much shorter than the edge: its points are joined there.
    static void merge_fronts(Ring2& corners) {
        for (std::size_t i = 0; i < corners.size(); ++i) {
            Corner &a = corners[i], &b = corners[(i + 1) % corners.size()];
            if (a.height_m <= 0 || b.height_m <= 0 || a.ends_in_before || a.ends_in_next) continue;
            const double before = (b.at - a.at).norm(), after = (front(b) - front(a)).norm();
            if (after > shortest_front * before) continue;
            (a.turn_rad > b.turn_rad ? b.ends_in_before : a.ends_in_next) = true;
        }
        for (std::size_t i = 0; i < corners.size(); ++i) {
            Corner& a = corners[i];
            const std::size_t n = corners.size();
            const Corner &before = corners[(i + n - 1) % n], &next = corners[(i + 1) % n];
            if (a.ends_in_next && (next.ends_in_before || next.ends_in_next)) a.ends_in_next = false;
            if (a.ends_in_before && (before.ends_in_next || before.ends_in_before)) a.ends_in_before = false;
        }
    }

    std::vector<std::vector<int>> add_first(const Ring2& corners) {
        std::vector<int> line;
        for (const Corner& corner : corners) {
            line.push_back(static_cast<int>(filled_.points.size()));
            filled_.points.push_back(corner.at);
        }
        return {line};
    }

    void add_layers(const Ring2& corners, std::vector<std::vector<int>>& lines) {
        const std::size_t l = static_cast<std::size_t>(&corners - rings_.data());
        const int steps = static_cast<int>(std::lround(std::max(1.0, layers_[l] * request_.refine)));
        if (layers_[l] == 0) return;
        for (int k = 1; k <= steps; ++k) {
            const double share =
                std::expm1(request_.growth * layers_[l] * k / steps) / std::expm1(request_.growth * layers_[l]);
            std::vector<int> line = lines.back();
            const std::size_t n = corners.size();
            const auto merged = [&](std::size_t i) {
                return k == steps && (corners[i].ends_in_next || corners[i].ends_in_before);
            };
            for (std::size_t i = 0; i < n; ++i)
                if (corners[i].height_m > 0 && !merged(i)) {
                    line[i] = static_cast<int>(filled_.points.size());
                    filled_.points.push_back(corners[i].at + share * corners[i].height_m * corners[i].inward);
                }
            for (std::size_t i = 0; i < n; ++i)
                if (merged(i)) line[i] = line[(corners[i].ends_in_next ? i + 1 : i + n - 1) % n];
            for (std::size_t i = 0; i < n; ++i) {
                const std::size_t j = (i + 1) % n;
                add_cell({lines.back()[i], lines.back()[j], line[j], line[i]});
            }
            lines.push_back(std::move(line));
        }
    }

    const Vec2& point(int i) const { return filled_.points[static_cast<std::size_t>(i)]; }

    void add_triangle(int a, int b, int c) {
        if (cross(point(b) - point(a), point(c) - point(a)) <= 0) return;
        filled_.cells.push_back({CellKind::triangle, {a, b, c, -1}});
    }

    // A quadrilateral, or a triangle where one side has no length, or two where it is not convex.
    void add_cell(const std::array<int, 4>& node) {
        const bool no_right = node[1] == node[2], no_left = node[0] == node[3];
        if (no_right && no_left) return;
        if (no_right) return add_triangle(node[0], node[1], node[3]);
        if (no_left || node[2] == node[3]) return add_triangle(node[0], node[1], node[2]);
        int dented = -1;
        for (std::size_t i = 0; i < 4; ++i) {
            const Vec2& at = point(node[i]);
            if (cross(point(node[(i + 1) % 4]) - at, point(node[(i + 3) % 4]) - at) <= 0) dented = static_cast<int>(i);
        }
        if (dented < 0) {
            filled_.cells.push_back({CellKind::quadrilateral, node});
            return;
        }
        const auto d = static_cast<std::size_t>(dented);
        add_triangle(node[d], node[(d + 1) % 4], node[(d + 2) % 4]);
        add_triangle(node[d], node[(d + 2) % 4], node[(d + 3) % 4]);
    }

    void add_triangles(const std::vector<std::vector<std::vector<int>>>& lines) {
        Loops2 loops;
        std::vector<int> number;
        std::vector<std::pair<Vec2, double>> sizes;
        for (const auto& of_loop : lines) {
            Loop loop;
            std::vector<int> line;
            for (const int node : of_loop.back())
                if (line.empty() || line.back() != node) line.push_back(node);
            while (line.size() > 1 && line.front() == line.back()) line.pop_back();
            for (std::size_t i = 0; i < line.size(); ++i) {
                const Vec2 &before = point(line[(i + line.size() - 1) % line.size()]), &p = point(line[i]),
                           &after = point(line[(i + 1) % line.size()]);
                loop.push_back(p);
                number.push_back(line[i]);
                sizes.emplace_back(p, 0.5 * ((p - before).norm() + (after - p).norm()));
            }
            loops.push_back(std::move(loop));
        }
        const SizeMap map(sizes, request_.growth, request_.h_max_m / request_.refine);
        const auto size = [&](const Vec2& p) { return map.at(p); };
        const Triangulation inner = triangulate(loops, size);
        for (std::size_t i = number.size(); i < inner.points.size(); ++i) {
            number.push_back(static_cast<int>(filled_.points.size()));
            filled_.points.push_back(inner.points[i]);
        }
        for (const auto& [a, b, c] : inner.triangles)
            filled_.cells.push_back({CellKind::triangle,
                                     {number[static_cast<std::size_t>(a)], number[static_cast<std::size_t>(b)],
                                      number[static_cast<std::size_t>(c)], -1}});
    }

    const FillRequest& request_;
    std::vector<Ring2> rings_;
    std::vector<int> layers_;
    FilledRegion filled_;
};

}  // namespace

FilledRegion fill(const FillRequest& request) {
    return Filler(request).made();
}

}  // namespace annulet
