#include "mom/static_pairs.hpp"

#include "mom/outer_rule.hpp"

namespace annulet {

namespace {

/// Local functions that the roles lack, and the vertical flux that a layer has on top: along z, the thickness times a
/// unit charge density; mirrored it points down.
void fit_roles(const Element& test, const Element& source, bool image, PairMoments& m) {
    const auto n_test = static_cast<std::size_t>(test.corners()), n_source = static_cast<std::size_t>(source.corners());
    if (test.role == ElementRole::panel || source.role == ElementRole::panel) m.vector = {};
    if (test.role == ElementRole::layer && source.role == ElementRole::layer)
        m.vector[n_test][n_source] = (image ? -1 : 1) * test.thickness_m * source.thickness_m * m.scalar;
}

/// The same for a flat element with a wire, whose moments with a unit charge density along z come along.
void fit_role(const Element& flat, double upward, PairMoments& m) {
    const auto n = static_cast<std::size_t>(flat.corners());
    if (flat.role == ElementRole::panel) m.vector = {};
    for (auto& row : m.vector) row[n] *= flat.role == ElementRole::layer ? upward * flat.thickness_m : 0;
}

}  // namespace

StaticPairs::StaticPairs(const std::vector<Element>& elements, std::optional<double> ground_plane_m)
    : elements_(elements) {
    for (const Element& element : elements) {
        const bool planar = element.kind != CellKind::segment;
        planar_.push_back(planar ? planar_element(element) : PlanarElement{});
        wire_.push_back(planar ? WireElement{} : wire_element(element));
        if (!ground_plane_m) continue;
        planar_image_.push_back(planar ? planar_.back().mirrored(*ground_plane_m) : PlanarElement{});
        wire_image_.push_back(wire_.back().mirrored(*ground_plane_m));
    }
}

PairMoments StaticPairs::wire_moments(int test, int source, bool image) const {
    const auto i = static_cast<std::size_t>(test), j = static_cast<std::size_t>(source);
    const WireElement& source_wire = (image ? wire_image_ : wire_)[j];
    if (elements_[i].kind != CellKind::segment) {
        PairMoments m = static_wire_and_surface(source_wire, planar_[i]);
        fit_role(elements_[i], 1, m);
        return transposed(m);
    }
    if (elements_[j].kind == CellKind::segment) return static_wire_pair(wire_[i], source_wire);
    PairMoments m = static_wire_and_surface(wire_[i], (image ? planar_image_ : planar_)[j]);
    fit_role(elements_[j], image ? -1 : 1, m);
    return m;
}

PairMoments StaticPairs::moments(int test, int source, bool image) const {
    const auto i = static_cast<std::size_t>(test), j = static_cast<std::size_t>(source);
    if (elements_[i].kind == CellKind::segment || elements_[j].kind == CellKind::segment)
        return wire_moments(test, source, image);
    const PlanarElement& t = planar_[i];
    const PlanarElement& s = (image ? planar_image_ : planar_)[j];
    PairMoments m = static_pair(t, s, distance(t, s) < 0.5 * t.diameter());
    fit_roles(elements_[i], elements_[j], image, m);
    return m;
}

}  // namespace annulet
