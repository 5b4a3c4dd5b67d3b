#include "mesh/triangulate.hpp"

#include <CGAL/Constrained_Delaunay_triangulation_2.h>
#include <CGAL/Exact_predicates_inexact_constructions_kernel.h>
#include <CGAL/Triangulation_face_base_with_info_2.h>
#include <CGAL/Triangulation_vertex_base_with_info_2.h>

#include <algorithm>
#include <annulet/core/diagnostics.hpp>
#include <cmath>
#include <deque>

namespace annulet {

namespace {

using Kernel = CGAL::Exact_predicates_inexact_constructions_kernel;
using VertexBase = CGAL::Triangulation_vertex_base_with_info_2<int, Kernel>;
using FaceBase =
    CGAL::Triangulation_face_base_with_info_2<int, Kernel, CGAL::Constrained_triangulation_face_base_2<Kernel>>;
using Cdt =
    CGAL::Constrained_Delaunay_triangulation_2<Kernel, CGAL::Triangulation_data_structure_2<VertexBase, FaceBase>,
                                               CGAL::Exact_predicates_tag>;
using Vertex = Cdt::Vertex_handle;
using Face = Cdt::Face_handle;

constexpr double widest_radius = 0.75;    // circumradius over wanted edge length; 0.58 is an equilateral triangle
constexpr double nearest_vertex = 0.45;   // in wanted edge lengths
constexpr double flattest_cosine = -0.4;  // at a new point over an edge of the outline
constexpr int most_passes = 40;
constexpr int smoothing_passes = 3, smoothing_rounds = 2;
enum Side { unknown = -1, outside = 0, within = 1 };

Vec2 vec(const Cdt::Point& p) {
    return {p.x(), p.y()};
}

class Refiner {
public:
    Refiner(std::span<const Loop> loops, const std::function<double(const Vec2&)>& size_m)
        : loops_(loops), size_m_(size_m) {
        for (const Loop& loop : loops) result_.points.insert(result_.points.end(), loop.begin(), loop.end());
        fixed_ = result_.points.size();
    }

    Triangulation made() {
        build();
        for (int pass = 0; pass < most_passes && refine() > 0; ++pass) {
        }
        collect();
        for (int round = 0; round < smoothing_rounds && result_.points.size() > fixed_; ++round) {
            for (int pass = 0; pass < smoothing_passes; ++pass) smooth();
            build();
            collect();
        }
        return std::move(result_);
    }

private:
    void build() {
        cdt_.clear();
        std::vector<Vertex> vertex;
        for (std::size_t i = 0; i < result_.points.size(); ++i) {
            const Vec2& p = result_.points[i];
            vertex.push_back(cdt_.insert(Cdt::Point(p.x(), p.y()), vertex.empty() ? Face() : vertex.back()->face()));
            // Of points in one place the first counts.
            if (cdt_.number_of_vertices() > distinct_) vertex.back()->info() = static_cast<int>(i);
            distinct_ = cdt_.number_of_vertices();
        }
        std::size_t start = 0;
        for (const Loop& loop : loops_) {
            for (std::size_t i = 0; i < loop.size(); ++i)
                cdt_.insert_constraint(vertex[start + i], vertex[start + (i + 1) % loop.size()]);
            start += loop.size();
        }
        if (cdt_.number_of_vertices() != distinct_)
            throw NumericalError("an outline to be triangulated crosses itself");
        distinct_ = 0;
        mark();
    }

    void mark() {
        for (Face face : cdt_.all_face_handles()) face->info() = unknown;
        std::deque<std::pair<Face, int>> queue{{cdt_.infinite_face(), outside}};
        while (!queue.empty()) {
            const auto [face, side] = queue.front();
            queue.pop_front();
            if (face->info() != unknown) continue;
            face->info() = side;
            for (int i = 0; i < 3; ++i)
                if (face->neighbor(i)->info() == unknown) {
                    const bool across = cdt_.is_constrained({face, i});
                    // Everything on this side first, so that parity is right.
                    if (across)
                        queue.emplace_back(face->neighbor(i), 1 - side);
                    else
                        queue.emplace_front(face->neighbor(i), side);
                }
        }
    }

    struct Candidate {
        double ratio, size_m;
        std::array<Vertex, 3> vertex;
    };

    std::size_t refine() {
        std::vector<Candidate> candidates;
        for (Face face : cdt_.finite_face_handles()) {
            if (face->info() != within) continue;
            const Vec2 a = vec(face->vertex(0)->point()), b = vec(face->vertex(1)->point()),
                       c = vec(face->vertex(2)->point());
            const double radius = (b - a).norm() * (c - b).norm() * (a - c).norm() / (2 * cross(b - a, c - a));
            const double size = size_m_((a + b + c) / 3);
            if (radius > widest_radius * size)
                candidates.push_back({radius / size, size, {face->vertex(0), face->vertex(1), face->vertex(2)}});
        }
        std::sort(candidates.begin(), candidates.end(),
                  [](const Candidate& a, const Candidate& b) { return a.ratio > b.ratio; });
        std::size_t inserted = 0;
        for (const Candidate& candidate : candidates) {
            Face face;
            if (!cdt_.is_face(candidate.vertex[0], candidate.vertex[1], candidate.vertex[2], face)) continue;
            const Cdt::Point centre = cdt_.circumcenter(face);
            if (insert(centre, face, candidate.size_m)) ++inserted;
        }
        return inserted;
    }

    bool insert(const Cdt::Point& p, Face near, double size_m) {
        Cdt::Locate_type type;
        int index = 0;
        const Face face = cdt_.locate(p, type, index, near);
        if (type == Cdt::VERTEX || type == Cdt::OUTSIDE_AFFINE_HULL || type == Cdt::OUTSIDE_CONVEX_HULL) return false;
        if (cdt_.is_infinite(face) || face->info() != within) return false;
        if (type == Cdt::EDGE && cdt_.is_constrained({face, index})) return false;
        std::vector<Cdt::Edge> border;
        cdt_.get_boundary_of_conflicts(p, std::back_inserter(border), face);
        const double least = nearest_vertex * std::min(size_m, size_m_(vec(p)));
        for (const Cdt::Edge& edge : border) {
            const Vec2 a = vec(edge.first->vertex(Cdt::cw(edge.second))->point()) - vec(p),
                       b = vec(edge.first->vertex(Cdt::ccw(edge.second))->point()) - vec(p);
            if (a.norm() < least || b.norm() < least) return false;
            if (cdt_.is_constrained(edge) && a.dot(b) < flattest_cosine * a.norm() * b.norm()) return false;
        }
        const Vertex vertex = cdt_.insert(p, face);
        vertex->info() = static_cast<int>(result_.points.size());
        result_.points.push_back(vec(p));
        Cdt::Face_circulator around = cdt_.incident_faces(vertex), first = around;
        do around->info() = within;
        while (++around != first);
        return true;
    }

    void collect() {
        result_.triangles.clear();
        for (Face face : cdt_.finite_face_handles())
            if (face->info() == within)
                result_.triangles.push_back(
                    {face->vertex(0)->info(), face->vertex(1)->info(), face->vertex(2)->info()});
    }

    const Vec2& point(int i) const { return result_.points[static_cast<std::size_t>(i)]; }

    // Inner points toward the centre of the triangles around them.
    void smooth() {
        std::vector<std::vector<std::size_t>> around(result_.points.size());
        for (std::size_t t = 0; t < result_.triangles.size(); ++t)
            for (const int i : result_.triangles[t]) around[static_cast<std::size_t>(i)].push_back(t);
        for (std::size_t i = fixed_; i < result_.points.size(); ++i) {
            Vec2 sum(0, 0);
            double weight = 0;
            for (const std::size_t t : around[i]) {
                const auto& [a, b, c] = result_.triangles[t];
                const double area = cross(point(b) - point(a), point(c) - point(a));
                sum += area * (point(a) + point(b) + point(c)) / 3;
                weight += area;
            }
            if (weight <= 0) continue;
            improve(i, sum / weight, around[i]);
        }
    }

    // Sine of the smallest angle, negative if folded.
    double quality(std::size_t triangle) const {
        const auto& [a, b, c] = result_.triangles[triangle];
        const Vec2 u = point(b) - point(a), v = point(c) - point(b), w = point(a) - point(c);
        const double u2 = u.squaredNorm(), v2 = v.squaredNorm(), w2 = w.squaredNorm();
        // Twice the area over the product of the two longer sides.
        return cross(u, v) * std::sqrt(std::min({u2, v2, w2}) / (u2 * v2 * w2));
    }

    double worst(const std::vector<std::size_t>& triangles) const {
        double least = 1;
        for (const std::size_t t : triangles) least = std::min(least, quality(t));
        return least;
    }

    // Moves a point toward `wanted` as far as its worst triangle gets better.
    void improve(std::size_t i, const Vec2& wanted, const std::vector<std::size_t>& triangles) {
        const Vec2 before = result_.points[i];
        Vec2 best = before;
        double most = worst(triangles);
        for (const double step : {1.0, 0.5, 0.25, -0.25}) {
            result_.points[i] = before + step * (wanted - before);
            if (const double now = worst(triangles); now > most) most = now, best = result_.points[i];
        }
        result_.points[i] = best;
    }

    std::span<const Loop> loops_;
    const std::function<double(const Vec2&)>& size_m_;
    std::size_t fixed_ = 0, distinct_ = 0;
    Triangulation result_;
    Cdt cdt_;
};

}  // namespace

Triangulation triangulate(std::span<const Loop> loops, const std::function<double(const Vec2&)>& size_m) {
    return Refiner(loops, size_m).made();
}

}  // namespace annulet
