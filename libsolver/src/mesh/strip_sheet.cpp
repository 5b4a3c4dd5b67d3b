#include "mesh/strip_sheet.hpp"

#include <algorithm>
#include <annulet/core/constants.hpp>
#include <cmath>
#include <limits>

#include "mesh/block_nodes.hpp"

namespace annulet {

namespace {

using Row = std::vector<Vec2>;

constexpr double aligned_fraction = 1e-6;  // of the strip's width: how exactly outlines must fit
constexpr double opening_fraction = 0.03;  // of an opening's area: how well whole columns must cover it
constexpr double widest_turn_rad = constants::pi / 12;

// The sheet in coordinates of the strip.
struct Frame {
    double tau_low = -1, tau_high = 1;
    double s_low_m = 0, s_high_m = 0;
};

bool is_ring(const Ribbon& ribbon) {
    return ribbon.closed() && !ribbon.has_seam();
}

bool is_straight(const Ribbon& ribbon) {
    const auto& parts = ribbon.centre().pieces();
    return !ribbon.closed() && parts.size() == 1 && !parts[0].is_arc && ribbon.widest_m() == ribbon.narrowest_m();
}

std::optional<Frame> ring_frame(const Ribbon& strip, const Shape& outline) {
    const auto sheet = ribbon_of(outline);
    if (!sheet || !is_ring(*sheet)) return std::nullopt;
    const Curve::Piece &own = strip.centre().pieces()[0], &other = sheet->centre().pieces()[0];
    const double half = 0.5 * strip.widest_m(), around = 0.5 * sheet->widest_m();
    if ((own.centre - other.centre).norm() > aligned_fraction * half) return std::nullopt;
    Frame frame;
    frame.tau_low = (own.radius_m - other.radius_m - around) / half;
    frame.tau_high = (own.radius_m - other.radius_m + around) / half;
    frame.s_high_m = strip.length_m();
    return frame;
}

std::optional<Frame> straight_frame(const Ribbon& strip, const Loops2& outline) {
    if (outline.size() != 1 || outline[0].size() != 4) return std::nullopt;
    const Curve::Piece& part = strip.centre().pieces()[0];
    const Vec2 along = (part.to - part.from).normalized();
    const double half = 0.5 * strip.widest_m();
    Frame frame;
    frame.s_low_m = frame.tau_low = std::numeric_limits<double>::infinity();
    frame.s_high_m = frame.tau_high = -frame.s_low_m;
    std::vector<Vec2> corners;
    for (const Vec2& p : outline[0]) {
        corners.emplace_back(along.dot(p - part.from), cross(along, p - part.from) / half);
        frame.s_low_m = std::min(frame.s_low_m, corners.back().x());
        frame.s_high_m = std::max(frame.s_high_m, corners.back().x());
        frame.tau_low = std::min(frame.tau_low, corners.back().y());
        frame.tau_high = std::max(frame.tau_high, corners.back().y());
    }
    const double slack = 2 * region_grain_m + aligned_fraction * half;
    for (const Vec2& corner : corners) {
        const double off_s = std::min(corner.x() - frame.s_low_m, frame.s_high_m - corner.x());
        const double off_tau = std::min(corner.y() - frame.tau_low, frame.tau_high - corner.y());
        if (off_s > slack || off_tau * half > slack) return std::nullopt;
    }
    return frame;
}

class StripSheet {
public:
    StripSheet(const StripGrids& grids, const Laminate& laminate, const SheetOutline& outline)
        : grids_(grids), laminate_(laminate), outline_(outline) {}

    std::optional<SheetPlan> made() {
        if (!find_strip() || !find_frame()) return std::nullopt;
        for (const std::size_t k : pieces_)
            if (grids_.across[k].taus != grids_.across[pieces_[0]].taus) return std::nullopt;
        set_taus();
        set_rows();
        return plan();
    }

private:
    const Piece& piece(std::size_t k) const { return grids_.layout.pieces[k]; }

    bool find_strip() {
        for (std::size_t k = 0; k < grids_.layout.pieces.size(); ++k) {
            const Metal& metal = grids_.model.metals[static_cast<std::size_t>(piece(k).metal)];
            if (!on_top(laminate_, metal.plane_m) && !on_bottom(laminate_, metal.plane_m)) continue;
            if (!pieces_.empty() && piece(pieces_[0]).metal != piece(k).metal) return false;
            pieces_.push_back(k);
        }
        return !pieces_.empty();
    }

    bool find_frame() {
        strip_ = piece(pieces_[0]).ribbon;
        std::optional<Frame> frame;
        if (is_ring(*strip_) && outline_.shape) frame = ring_frame(*strip_, *outline_.shape);
        if (is_straight(*strip_)) frame = straight_frame(*strip_, outline_.outer);
        if (!frame) return false;
        const double slack = 2 * region_grain_m + aligned_fraction * strip_->widest_m();
        frame_ = *frame;
        return frame->tau_low <= -1 + slack / strip_->widest_m() && frame->tau_high >= 1 - slack / strip_->widest_m() &&
               frame->s_low_m <= slack && frame->s_high_m >= strip_->length_m() - slack;
    }

    // Distances from the edge of metal outward, 0 excluded, `length_m` included.
    std::vector<double> steps_outward(double length_m, double first_m) const {
        if (length_m <= 3 * region_grain_m + aligned_fraction * strip_->widest_m()) return {};
        const double infinity = std::numeric_limits<double>::infinity();
        const SizeField field(length_m, first_m, infinity, wave_cell_m(grids_.options), sheet_growth);
        const double n = refined_cells(whole_cells(field.cells()), grids_.options.refine);
        std::vector<double> steps;
        for (double i = 1; i < n; ++i) steps.push_back(field.position_m(field.cells() * i / n));
        steps.push_back(length_m);
        return steps;
    }

    void set_taus() {
        const double half = 0.5 * strip_->widest_m(), edge = edge_cell_m(2 * half, grids_.options);
        taus_ = grids_.across[pieces_[0]].taus;
        for (const double d : steps_outward((-1 - frame_.tau_low) * half, edge))
            taus_.insert(taus_.begin(), -1 - d / half);
        for (const double d : steps_outward((frame_.tau_high - 1) * half, edge)) taus_.push_back(1 + d / half);
    }

    void add_rows(const std::vector<std::vector<Vec2>>& lines) {
        for (std::size_t i = rows_.empty() ? 0 : 1; i < lines[0].size(); ++i) {
            Row row;
            for (const auto& line : lines) row.push_back(line[i]);
            rows_.push_back(std::move(row));
        }
    }

    void add_piece(std::size_t k) {
        for (std::size_t b = 0; b < piece(k).blocks(); ++b)
            add_rows(block_lines(piece(k), grids_.along.blocks[k][b], b, taus_, grids_.options.refine));
    }

    Row first_row(std::size_t k) const {
        Row row;
        for (const auto& line : block_lines(piece(k), grids_.along.blocks[k][0], 0, taus_, grids_.options.refine))
            row.push_back(line[0]);
        return row;
    }

    static double end_cell(const AlongBlock& block, bool at_end) {
        if (block.equal) return block.length_m / block.cells;
        return at_end ? block.h_to_m : block.h_from_m;
    }

    // Number of rows that bridges over this gap ask for, 0 without a bridge.
    double bridge_rows(std::size_t from, std::size_t to) const {
        double rows = 0;
        for (std::size_t i = 0; i < grids_.layout.spans.size(); ++i) {
            const Span& span = grids_.layout.spans[i];
            const auto joins = [&](const Landing& a, const Landing& b) {
                return a.piece == static_cast<int>(from) && a.at_end && b.piece == static_cast<int>(to) && !b.at_end;
            };
            if (joins(span.from, span.to) || joins(span.to, span.from))
                rows = refined_cells(grids_.along.span_cells[i], grids_.options.refine);
        }
        return rows;
    }

    // Over a bridged gap rows stand on chords, as those of the bridge do.
    void add_gap(std::size_t from, std::size_t to, bool wraps) {
        const double turn = wraps ? strip_->length_m() : 0;
        const Piece &before = piece(from), &after = piece(to);
        if (const double n = bridge_rows(from, to); n > 0) {
            const Row start = rows_.back(), end = first_row(to);
            for (double i = 1; i < n; ++i) {
                Row row;
                for (std::size_t j = 0; j < start.size(); ++j) row.push_back((start[j] * (n - i) + end[j] * i) / n);
                rows_.push_back(std::move(row));
            }
            rows_.push_back(end);
            return;
        }
        AlongBlock gap;
        gap.length_m = after.fronts.front().s_m(0) + turn - before.fronts.back().s_m(0);
        gap.h_from_m = end_cell(grids_.along.blocks[from].back(), true);
        gap.h_to_m = end_cell(grids_.along.blocks[to].front(), false);
        gap.h_max_m = wave_cell_m(grids_.options);
        if (is_ring(*strip_))
            gap.h_max_m = std::min(gap.h_max_m, strip_->centre().pieces()[0].radius_m * widest_turn_rad);
        gap.cells = whole_cells(SizeField(gap.length_m, gap.h_from_m, gap.h_to_m, gap.h_max_m).cells());
        const std::vector<double> fractions = gap.fractions(grids_.options.refine);
        std::vector<std::vector<Vec2>> lines;
        for (const double tau : taus_) {
            const double within = std::clamp(tau, -1.0, 1.0);
            lines.push_back(block_nodes(*strip_, tau, before.fronts.back().s_m(within),
                                        after.fronts.front().s_m(within) + turn, fractions, false));
        }
        add_rows(lines);
        rows_.back() = first_row(to);
    }

    // Rows beyond an end of a straight strip, the farthest last.
    std::vector<Row> rows_beyond(bool at_end) const {
        const Curve::Piece& part = strip_->centre().pieces()[0];
        const Vec2 along = (part.to - part.from).normalized();
        const AlongBlock& block =
            at_end ? grids_.along.blocks[pieces_.back()].back() : grids_.along.blocks[pieces_[0]].front();
        const Piece& last = piece(at_end ? pieces_.back() : pieces_[0]);
        const double s = (at_end ? last.fronts.back() : last.fronts.front()).s_m(0);
        std::vector<Row> rows;
        for (const double d :
             steps_outward(at_end ? frame_.s_high_m - s : s - frame_.s_low_m, end_cell(block, at_end))) {
            Row row;
            for (const double tau : taus_)
                row.push_back(part.from + along * (at_end ? s + d : s - d) +
                              0.5 * tau * strip_->widest_m() * left_of(along));
            rows.push_back(std::move(row));
        }
        return rows;
    }

    void set_rows() {
        for (std::size_t i = 0; i < pieces_.size(); ++i) {
            add_piece(pieces_[i]);
            if (i + 1 < pieces_.size()) add_gap(pieces_[i], pieces_[i + 1], false);
        }
        closed_ = strip_->closed();
        if (closed_) {
            if (!piece(pieces_[0]).loop) add_gap(pieces_.back(), pieces_[0], true);
            rows_.pop_back();
            return;
        }
        std::vector<Row> before = rows_beyond(false), after = rows_beyond(true);
        std::reverse(before.begin(), before.end());
        rows_.insert(rows_.begin(), before.begin(), before.end());
        rows_.insert(rows_.end(), after.begin(), after.end());
    }

    std::optional<SheetPlan> plan() const {
        SheetPlan plan;
        const std::size_t lines = taus_.size(), count = rows_.size();
        for (const Row& row : rows_) plan.points.insert(plan.points.end(), row.begin(), row.end());
        double removed = 0;
        for (std::size_t i = 0; i < (closed_ ? count : count - 1); ++i)
            for (std::size_t j = 0; j + 1 < lines; ++j) {
                const std::size_t next = (i + 1) % count;
                const std::array<std::size_t, 4> node{i * lines + j, next * lines + j, next * lines + j + 1,
                                                      i * lines + j + 1};
                SheetMesh::Column column;
                Loop corners;
                for (std::size_t c = 0; c < 4; ++c) {
                    column.node[c] = static_cast<int>(node[c]);
                    corners.push_back(plan.points[node[c]]);
                }
                if (!convex(corners)) return std::nullopt;
                const bool open = !laminate_.openings.empty() &&
                                  !inside(outline_.region, (corners[0] + corners[1] + corners[2] + corners[3]) / 4);
                if (open)
                    removed += signed_area(corners);
                else
                    plan.columns.push_back(column);
            }
        const double wanted = area_of(outline_.outer) - area_of(outline_.region);
        if (std::abs(removed - wanted) > opening_fraction * wanted) return std::nullopt;
        return plan;
    }

    static bool convex(const Loop& corners) {
        for (std::size_t i = 0; i < 4; ++i)
            if (cross(corners[(i + 1) % 4] - corners[i], corners[(i + 3) % 4] - corners[i]) <= 0) return false;
        return true;
    }

    const StripGrids& grids_;
    const Laminate& laminate_;
    const SheetOutline& outline_;
    std::vector<std::size_t> pieces_;
    std::shared_ptr<const Ribbon> strip_;
    Frame frame_;
    std::vector<double> taus_;
    std::vector<Row> rows_;
    bool closed_ = false;
};

}  // namespace

double wave_cell_m(const MeshOptions& options) {
    if (options.top_frequency_hz <= 0) return std::numeric_limits<double>::infinity();
    return constants::c0_m_per_s / options.top_frequency_hz / options.cells_per_wavelength;
}

std::optional<SheetPlan> strip_sheet(const StripGrids& grids, const Laminate& laminate, const SheetOutline& outline) {
    return StripSheet(grids, laminate, outline).made();
}

}  // namespace annulet
