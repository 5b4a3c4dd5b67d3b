// Slits: gaps of a given length through continuous metal.
#include <cmath>

#include "mesh/bridges.hpp"

namespace annulet {

namespace {

class SlitPlacer {
public:
    SlitPlacer(const Model& model, Layout& layout, int place, const Place& drawn, const Across& across,
               MeshFaults& faults)
        : model_(model),
          layout_(layout),
          place_(place),
          drawn_(drawn),
          across_(across),
          faults_(faults),
          a_(across.from.head<2>()),
          b_(across.to.head<2>()) {}

    void put() {
        if (!sound()) return;
        const double length = (b_ - a_).norm();
        const Survey survey(model_, layout_.pieces, across_.from.z(), a_, b_, 1e-3 * length);
        const int piece = crossed_piece(survey);
        if (piece >= 0 && reaches_edges(survey, piece)) divide(piece);
    }

private:
    void fault(const std::string& text, std::string help = {}) {
        faults_.add(drawn_.where, drawn_.what + " " + text, std::move(help));
    }

    bool sound() {
        if (!across_.from.allFinite() || !across_.to.allFinite() || !std::isfinite(across_.gap_m))
            return fault("has a slit with a number that is not finite"), false;
        if (std::abs(across_.from.z() - across_.to.z()) > 1e-9)
            return fault("is drawn across from one plane to another"), false;
        if ((b_ - a_).norm() < 1e-9) return fault("has no width: both ends of its line are at " + mm(a_)), false;
        if (across_.gap_m < 1e-9)
            return fault("has a gap of " + mm(across_.gap_m) + ": a source of no length has no finite reactance"),
                   false;
        return true;
    }

    int crossed_piece(const Survey& survey) {
        int found = -1, count = 0;
        for (const Survey::Stretch& stretch : survey.stretches()) {
            if (stretch.piece < 0 || stretch.to_m - stretch.from_m < 2e-3 * (b_ - a_).norm()) continue;
            found = stretch.piece;
            ++count;
        }
        if (count == 0 && survey.any_metal())
            fault(fmt::format("touches no metal: its line starts at {}, {} from the nearest edge", mm(a_),
                              mm(survey.distance_to_edge(a_))));
        if (count == 0 && !survey.any_metal())
            fault("touches no metal: there is none on its plane at height " + mm(across_.from.z()));
        if (count > 1) fault("crosses more than one piece of metal");
        return count == 1 ? found : -1;
    }

    const Metal& metal_of(int piece) const {
        return model_.metals[static_cast<std::size_t>(layout_.pieces[static_cast<std::size_t>(piece)].metal)];
    }

    bool reaches_edges(const Survey& survey, int piece) {
        const double tolerance = 0.01 * layout_.pieces[static_cast<std::size_t>(piece)].ribbon->narrowest_m();
        for (const Vec2& end : {a_, b_}) {
            const double distance = survey.distance_to_edge(end);
            if (survey.piece_at(end) < 0 || distance <= tolerance) continue;
            fault(fmt::format("does not cross metal '{}' from edge to edge: its line has an end at {}, {} inside",
                              metal_of(piece).name, mm(end), mm(distance)));
            return false;
        }
        return true;
    }

    void divide(int index) {
        Piece& piece = layout_.pieces[static_cast<std::size_t>(index)];
        const double length = (b_ - a_).norm(), width = piece.ribbon->widest_m();
        const Vec2 along = (b_ - a_) / length;
        // Past the edges by a little, as curved edges bulge out beside the drawn line.
        const double reach = length + 2 * (0.02 * width + across_.gap_m);
        const Rectangle slit{0.5 * (a_ + b_), {reach, across_.gap_m}, std::atan2(along.y(), along.x())};
        const Crossings crossings = find_crossings(piece.ribbon, std::make_shared<const Region>(slit));
        const std::string too_long = fmt::format("does not fit: its gap of {} reaches the end of metal '{}'",
                                                 mm(across_.gap_m), metal_of(index).name);
        if (crossings.kind == Crossing::everything) return fault(too_long);
        if (crossings.kind != Crossing::full || crossings.tracks.size() != 1)
            return fault(fmt::format("does not cross metal '{}' once from edge to edge", metal_of(index).name));
        const Obstacle obstacle = insert_slit(piece, crossings.tracks[0], static_cast<int>(layout_.slits.size()));
        if (obstacle.kind == Obstacle::Kind::end) return fault(too_long);
        if (obstacle.kind == Obstacle::Kind::slit) {
            const int other = layout_.slits[static_cast<std::size_t>(obstacle.slit)].place;
            return fault("touches or overlaps " + places_of(model_)[static_cast<std::size_t>(other)].what,
                         "move them apart");
        }
        layout_.slits.push_back({place_, left_of(along), across_.gap_m});
    }

    const Model& model_;
    Layout& layout_;
    int place_;
    const Place& drawn_;
    const Across& across_;
    MeshFaults& faults_;
    Vec2 a_, b_;
};

}  // namespace

void place_slit(const Model& model, Layout& layout, int place, const Place& drawn, const Across& across,
                MeshFaults& faults) {
    SlitPlacer(model, layout, place, drawn, across, faults).put();
}

}  // namespace annulet
