#include "mesh/along_grid.hpp"

#include <algorithm>
#include <annulet/core/constants.hpp>
#include <cmath>
#include <limits>

#include "mesh/cross_grid.hpp"

namespace annulet {

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double widest_turn_rad = constants::pi / 12;  // 24 cells around a full circle
constexpr double fewest_cells_per_gap = 2;
constexpr double fewest_cells_per_piece = 8;

class AlongPlanner {
public:
    AlongPlanner(const Layout& layout, const MeshOptions& options) : layout_(layout), options_(options) {
        wave_m_ = options.top_frequency_hz > 0
                      ? constants::c0_m_per_s / options.top_frequency_hz / options.cells_per_wavelength
                      : infinity;
    }

    AlongGrid planned() {
        for (const Span& span : layout_.spans) grid_.span_cells.push_back(gap_cells(span.length_m, span.width_m));
        for (std::size_t k = 0; k < layout_.pieces.size(); ++k) start_piece(k);
        set_ends();
        spread();
        for (std::size_t k = 0; k < layout_.pieces.size(); ++k) set_blocks(k);
        return std::move(grid_);
    }

private:
    double gap_cells(double length_m, double width_m) const {
        return std::max(fewest_cells_per_gap, whole_cells(length_m / std::min(wave_m_, width_m)));
    }

    double block_length(const Piece& piece, std::size_t block) const {
        if (piece.fronts.empty()) return piece.ribbon->length_m();
        const bool wraps = block + 1 == piece.fronts.size();
        const double from = piece.fronts[block].s_m(0), to = piece.fronts[wraps ? 0 : block + 1].s_m(0);
        return to - from + (wraps ? piece.ribbon->length_m() : 0);
    }

    double largest(const Piece& piece, std::size_t block, double piece_length) const {
        double h = std::min(wave_m_, piece_length / fewest_cells_per_piece);
        const double from = piece.fronts.empty() ? 0 : piece.fronts[block].s_m(0);
        const double to = from + block_length(piece, block), length = piece.ribbon->length_m();
        for (const Curve::Piece& part : piece.ribbon->centre().pieces())
            for (const double turn : {-length, 0.0, length, 2 * length}) {
                const double overlap =
                    std::min(to, part.start_m + part.length_m + turn) - std::max(from, part.start_m + turn);
                const bool met = overlap > 1e-6 * length && (turn == 0 || piece.ribbon->closed());
                if (met && part.is_arc) h = std::min(h, part.radius_m * widest_turn_rad);
            }
        return h;
    }

    void start_piece(std::size_t k) {
        const Piece& piece = layout_.pieces[k];
        double total = 0;
        for (std::size_t b = 0; b < piece.blocks(); ++b) total += block_length(piece, b);
        std::vector<AlongBlock> blocks(piece.blocks());
        for (std::size_t b = 0; b < blocks.size(); ++b) {
            blocks[b].length_m = block_length(piece, b);
            blocks[b].h_max_m = largest(piece, b, total);
            if (piece.block_slit[b] >= 0) {
                blocks[b].equal = true;
                blocks[b].cells = gap_cells(blocks[b].length_m, piece.ribbon->narrowest_m());
            }
        }
        grid_.blocks.push_back(std::move(blocks));
        std::vector<double> h;
        for (std::size_t f = 0; f < piece.fronts.size(); ++f) h.push_back(wanted(k, f));
        h_.push_back(std::move(h));
    }

    double wanted(std::size_t k, std::size_t f) const {
        const Piece& piece = layout_.pieces[k];
        const Front& front = piece.fronts[f];
        const double width = piece.ribbon->width_m(std::fmod(front.s_m(0), piece.ribbon->length_m()));
        const double edge = std::max(edge_cell_m(width, options_), 0.02 * width);
        switch (front.kind) {
            case Front::Kind::joint:
                return front.sharp ? 0.5 * width : infinity;
            case Front::Kind::slit_side: {
                const std::size_t slit_block = front.enters_slit ? f : (f + piece.blocks() - 1) % piece.blocks();
                const AlongBlock& block = grid_.blocks[k][slit_block];
                return block.length_m / block.cells;
            }
            case Front::Kind::cut_end:
                return std::clamp(0.5 * front.opening_m, edge / 8, edge);
            case Front::Kind::sheet_edge:
                return 0.25 * width;
            case Front::Kind::free_end:
                break;
        }
        return edge;
    }

    double& end_size(const Landing& end) {
        auto& h = h_[static_cast<std::size_t>(end.piece)];
        return end.at_end ? h.back() : h.front();
    }

    // A gap as wide as the strip leaves no open end beside it; a joined end is none at all.
    void set_ends() {
        for (std::size_t i = 0; i < layout_.spans.size(); ++i) {
            const Span& span = layout_.spans[i];
            const double cell = span.length_m / grid_.span_cells[i];
            for (const Landing& end : {span.from, span.to})
                end_size(end) = span.full_width ? cell : std::min(end_size(end), cell);
        }
        for (const Join& join : layout_.joins) end_size(join.from) = end_size(join.to) = infinity;
    }

    static bool lower(double& h, double bound) {
        if (h <= bound) return false;
        h = bound;
        return true;
    }

    // Sizes grow no faster than the field allows, through all fronts and joins.
    void spread() {
        bool changed = true;
        for (std::size_t round = 0; changed && round < 4 + 2 * layout_.pieces.size(); ++round) {
            changed = false;
            for (std::size_t k = 0; k < h_.size(); ++k) changed = spread_in(k) || changed;
            for (const Join& join : layout_.joins) {
                changed = lower(end_size(join.from), end_size(join.to)) || changed;
                changed = lower(end_size(join.to), end_size(join.from)) || changed;
            }
        }
    }

    bool spread_in(std::size_t k) {
        auto& h = h_[k];
        const auto& blocks = grid_.blocks[k];
        const std::size_t n = h.size();
        bool changed = false;
        for (std::size_t pass = 0; pass < 2 && n > 0; ++pass)
            for (std::size_t i = 0; i < blocks.size(); ++i) {
                const std::size_t b = pass == 0 ? i : blocks.size() - 1 - i;
                double &from = h[b], &to = h[(b + 1) % n];
                if (blocks[b].equal) continue;
                const double rise = SizeField::growth * blocks[b].length_m;
                changed = lower(from, blocks[b].h_max_m) || changed;
                changed = lower(to, blocks[b].h_max_m) || changed;
                changed = lower(from, to + rise) || changed;
                changed = lower(to, from + rise) || changed;
            }
        return changed;
    }

    void set_blocks(std::size_t k) {
        auto& blocks = grid_.blocks[k];
        const auto& h = h_[k];
        for (std::size_t b = 0; b < blocks.size(); ++b) {
            AlongBlock& block = blocks[b];
            if (block.equal) continue;
            if (h.empty()) {
                // A multiple of four keeps both mirror lines of a ring.
                block.cells = 4 * whole_cells(block.length_m / block.h_max_m / 4);
                block.equal = true;
                continue;
            }
            block.h_from_m = h[b];
            block.h_to_m = h[(b + 1) % h.size()];
            block.cells = whole_cells(SizeField(block.length_m, block.h_from_m, block.h_to_m, block.h_max_m).cells());
        }
    }

    const Layout& layout_;
    const MeshOptions& options_;
    double wave_m_ = infinity;
    AlongGrid grid_;
    std::vector<std::vector<double>> h_;  // per piece, per front
};

}  // namespace

std::vector<double> AlongBlock::fractions(double refine) const {
    const double n = refined_cells(cells, refine);
    std::vector<double> x{0};
    if (equal) {
        for (double i = 1; i < n; ++i) x.push_back(i / n);
    } else {
        const SizeField field(length_m, h_from_m, h_to_m, h_max_m);
        for (double i = 1; i < n; ++i) x.push_back(field.position_m(field.cells() * i / n) / length_m);
    }
    x.push_back(1);
    return x;
}

AlongGrid along_grid(const Layout& layout, const MeshOptions& options) {
    return AlongPlanner(layout, options).planned();
}

}  // namespace annulet
