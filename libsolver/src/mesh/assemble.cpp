#include "mesh/assemble.hpp"

#include <algorithm>
#include <cmath>
#include <numeric>

#include "mesh/block_nodes.hpp"

namespace annulet {

namespace {

using Row = std::vector<int>;

bool same(const Conductor& a, const Conductor& b) {
    return a.name == b.name && a.conductivity_s_per_m == b.conductivity_s_per_m && a.thickness_m == b.thickness_m &&
           a.roughness_rms_m == b.roughness_rms_m;
}

class Assembler {
public:
    Assembler(const Model& model, const Layout& layout, const std::vector<CrossGrid>& across, const AlongGrid& along,
              double refine)
        : model_(model),
          layout_(layout),
          across_(across),
          along_(along),
          refine_(refine),
          ends_(layout.pieces.size()) {}

    Mesh made() {
        for (const Port& port : model_.ports) mesh_.ports.push_back({port.name, {}, 0});
        for (const Lumped& part : model_.lumped) mesh_.lumped.push_back({part.name, {}, 0});
        mesh_.ground_plane_m = model_.ground_plane_m;
        for (std::size_t k = 0; k < layout_.pieces.size(); ++k) add_piece(k);
        for (std::size_t k = 0; k < layout_.spans.size(); ++k) add_span(k);
        faults_.throw_if_any();
        return std::move(mesh_);
    }

private:
    struct Ends {
        Row start, end;
    };

    const Metal& metal(const Piece& piece) const { return model_.metals[static_cast<std::size_t>(piece.metal)]; }

    int conductor(const Conductor& wanted) {
        const auto found = std::find_if(mesh_.conductors.begin(), mesh_.conductors.end(),
                                        [&](const Conductor& known) { return same(known, wanted); });
        const auto index = found - mesh_.conductors.begin();
        if (found == mesh_.conductors.end()) mesh_.conductors.push_back(wanted);
        return static_cast<int>(index);
    }

    int add_node(const Vec2& p, double z_m) {
        mesh_.nodes.push_back(lift(p, z_m));
        return static_cast<int>(mesh_.nodes.size()) - 1;
    }

    Gap& gap_of(int place) {
        const auto index = static_cast<std::size_t>(place);
        return index < mesh_.ports.size() ? mesh_.ports[index] : mesh_.lumped[index - mesh_.ports.size()];
    }

    // The row already made at the other side of a join, in the order of this end.
    const Row* joined_row(std::size_t piece, bool at_end, Row& turned) const {
        for (const Join& join : layout_.joins)
            for (const bool forward : {true, false}) {
                const Landing &here = forward ? join.from : join.to, &there = forward ? join.to : join.from;
                if (here.piece != static_cast<int>(piece) || here.at_end != at_end) continue;
                const Ends& other = ends_[static_cast<std::size_t>(there.piece)];
                turned = there.at_end ? other.end : other.start;
                if (turned.empty()) continue;
                if (join.to.tau_a > join.to.tau_b) std::reverse(turned.begin(), turned.end());
                return &turned;
            }
        return nullptr;
    }

    Row new_row(const std::vector<std::vector<Vec2>>& lines, std::size_t i, double z_m) {
        Row row;
        for (const auto& line : lines) row.push_back(add_node(line[i], z_m));
        return row;
    }

    void add_piece(std::size_t index) {
        const Piece& piece = layout_.pieces[index];
        const double z = metal(piece).plane_m;
        const std::size_t blocks = piece.blocks();
        const int foil = conductor(metal(piece).conductor);
        Row first, last, turned;
        for (std::size_t b = 0; b < blocks; ++b) {
            const auto lines = block_lines(piece, along_.blocks[index][b], b, across_[index].taus, refine_);
            const std::size_t n = lines[0].size() - 1;
            if (b == 0) {
                const Row* known = piece.loop ? nullptr : joined_row(index, false, turned);
                first = last = known != nullptr ? *known : new_row(lines, 0, z);
                ends_[index].start = first;
            }
            for (std::size_t i = 1; i <= n; ++i) {
                const bool at_last = b + 1 == blocks && i == n;
                const Row* known = !at_last ? nullptr : piece.loop ? &first : joined_row(index, true, turned);
                Row next = known != nullptr ? *known : new_row(lines, i, z);
                add_cells(piece, b, last, next, foil);
                last = std::move(next);
            }
        }
        ends_[index].end = last;
    }

    void add_cells(const Piece& piece, std::size_t block, const Row& from, const Row& to, int foil) {
        const int slit = piece.block_slit[block];
        const SlitGap* gap = slit >= 0 ? &layout_.slits[static_cast<std::size_t>(slit)] : nullptr;
        for (std::size_t j = 0; j + 1 < from.size(); ++j) {
            const int cell =
                add_cell({from[j], to[j], to[j + 1], from[j + 1]}, gap != nullptr ? -1 : foil, metal(piece));
            if (gap == nullptr) continue;
            Gap& target = gap_of(gap->place);
            target.length_m = gap->length_m;
            target.members.push_back({cell, lift(gap->direction / gap->length_m, 0)});
        }
    }

    int add_cell(const std::array<int, 4>& corner, int foil, const Metal& metal) {
        Cell cell;
        cell.node = corner;
        cell.conductor = foil;
        mesh_.cells.push_back(cell);
        for (std::size_t i = 0; i < 4; ++i) {
            const Vec3& at = node(corner[i]);
            const Vec3 a = node(corner[(i + 1) % 4]) - at, b = node(corner[(i + 3) % 4]) - at;
            if (a.cross(b).z() > 0) continue;
            if (metal.where == bent_) break;
            bent_ = metal.where;
            faults_.add(
                metal.where,
                fmt::format("metal '{}' cannot be divided into convex cells near {}: it turns or is cut too sharply "
                            "for its width",
                            metal.name, mm(Vec2(at.head<2>()))));
            break;
        }
        return static_cast<int>(mesh_.cells.size()) - 1;
    }

    const Vec3& node(int index) const { return mesh_.nodes[static_cast<std::size_t>(index)]; }

    Row landing_row(const Landing& end) const {
        const auto piece = static_cast<std::size_t>(end.piece);
        const Row& row = end.at_end ? ends_[piece].end : ends_[piece].start;
        Row landed;
        for (const int line : landing_lines(across_[piece], end)) landed.push_back(row[static_cast<std::size_t>(line)]);
        return landed;
    }

    void add_span(std::size_t index) {
        const Span& span = layout_.spans[index];
        const Row from = landing_row(span.from), to = landing_row(span.to);
        const Metal& owner = metal(layout_.pieces[static_cast<std::size_t>(span.from.piece)]);
        const double n = refined_cells(along_.span_cells[index], refine_);
        Gap& gap = gap_of(span.place);
        gap.length_m = span.length_m;
        Row last = from;
        for (double i = 1; i <= n; ++i) {
            Row next = to;
            if (i < n)
                for (std::size_t j = 0; j < from.size(); ++j) {
                    const Vec3 p = (node(from[j]) * (n - i) + node(to[j]) * i) / n;
                    next[j] = add_node(p.head<2>(), p.z());
                }
            for (std::size_t j = 0; j + 1 < from.size(); ++j) {
                const int cell = add_cell({last[j], next[j], next[j + 1], last[j + 1]}, -1, owner);
                gap.members.push_back({cell, lift(span.direction / span.length_m, 0)});
            }
            last = std::move(next);
        }
    }

    const Model& model_;
    const Layout& layout_;
    const std::vector<CrossGrid>& across_;
    const AlongGrid& along_;
    double refine_;
    std::vector<Ends> ends_;
    Mesh mesh_;
    MeshFaults faults_;
    Position bent_{-1, -1};
};

double cells_over(const CrossGrid& grid, const Landing& landing, double refine) {
    const auto [low, high] = std::minmax(landing.tau_a, landing.tau_b);
    double sum = 0;
    for (std::size_t i = 0; i + 1 < grid.lines.size(); ++i)
        if (grid.lines[i] >= low && grid.lines[i + 1] <= high) sum += refined_cells(grid.cells[i], refine);
    return sum;
}

}  // namespace

double count_unknowns(const Layout& layout, const std::vector<CrossGrid>& across, const AlongGrid& along,
                      double refine) {
    double unknowns = 0;
    for (std::size_t k = 0; k < layout.pieces.size(); ++k) {
        double rows = 0;
        for (const AlongBlock& block : along.blocks[k]) rows += refined_cells(block.cells, refine);
        const double columns = cells_over(across[k], Landing{}, refine);
        unknowns += (rows - (layout.pieces[k].loop ? 0 : 1)) * columns + rows * (columns - 1);
    }
    for (std::size_t k = 0; k < layout.spans.size(); ++k) {
        const Landing& end = layout.spans[k].from;
        const double rows = refined_cells(along.span_cells[k], refine);
        const double columns = cells_over(across[static_cast<std::size_t>(end.piece)], end, refine);
        unknowns += (rows + 1) * columns + rows * (columns - 1);
    }
    for (const Join& join : layout.joins)
        unknowns += cells_over(across[static_cast<std::size_t>(join.from.piece)], join.from, refine);
    return unknowns;
}

double matrix_bytes(double unknowns) {
    constexpr double work_space = 2.5;  // matrix, factors and tables
    return work_space * 16 * unknowns * unknowns;
}

Mesh assemble(const Model& model, const Layout& layout, const std::vector<CrossGrid>& across, const AlongGrid& along,
              double refine) {
    return Assembler(model, layout, across, along, refine).made();
}

}  // namespace annulet
