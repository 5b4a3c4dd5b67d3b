#include "model/reading.hpp"

#include <annulet/model/materials.hpp>

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <cmath>

namespace annulet {

namespace {

constexpr double nan = std::numeric_limits<double>::quiet_NaN();
constexpr double usual_foil_m = 35e-6;  // one ounce per square foot, common practice, no source
constexpr Range permittivity_range{1, 1000};

std::vector<std::string> with(std::vector<std::string> keys, const std::vector<std::string>& more) {
    keys.insert(keys.end(), more.begin(), more.end());
    return keys;
}

// [["100 MHz", 4.4], ["3 GHz", 4.25]]
void read_permittivity_table(const toml::array& table, Fields& fields, Laminate& laminate) {
    Context& context = fields.context();
    if (table.empty()) {
        context.faults.add(position_of(table), fmt::format("{} is an empty list", fields.named("permittivity")));
        return;
    }
    double before = 0;
    for (const toml::node& row : table) {
        const toml::array* pair = row.as_array();
        if (pair == nullptr || pair->size() != 2) {
            context.faults.add(
                position_of(row),
                fmt::format("each entry of {} must be [frequency, permittivity]", fields.named("permittivity")),
                "write [\"1 GHz\", 4.3]");
            continue;
        }
        const double frequency = context.quantity((*pair)[0], "frequency in " + fields.named("permittivity"),
                                                  kinds::frequency, ranges::frequency);
        const double value =
            context.quantity((*pair)[1], "value in " + fields.named("permittivity"), kinds::number, permittivity_range);
        if (frequency <= before) {
            context.faults.add(position_of((*pair)[0]),
                               fmt::format("frequencies of {} must ascend, but {} follows {}",
                                           fields.named("permittivity"), to_text(frequency, kinds::frequency.dimension),
                                           to_text(before, kinds::frequency.dimension)));
        }
        before = frequency;
        laminate.permittivity.push_back({frequency, value});
    }
}

void read_permittivity(Fields& fields, Laminate& laminate) {
    const toml::node* node = fields.need("permittivity", "4.3");
    const double at = fields.number("permittivity_at", kinds::frequency, ranges::frequency, 1e9);
    if (node == nullptr) return;
    if (const toml::array* table = node->as_array()) {
        fields.refuse({"permittivity_at"}, "beside a table of permittivities");
        read_permittivity_table(*table, fields, laminate);
        return;
    }
    laminate.permittivity.push_back(
        {at, fields.context().quantity(*node, fields.named("permittivity"), kinds::number, permittivity_range)});
}

void read_outline(Fields& fields, Laminate& laminate, Reading& reading) {
    if (fields.need("outline", "{ disc = { center = [0, 0], radius = 60 } }") == nullptr) return;
    const toml::table* table = fields.table("outline");
    if (table == nullptr) return;
    Context& context = fields.context();
    const std::string what = "the outline of " + fields.what();
    Fields outline(*table, what, context, with({"around"}, shape_keys));
    const std::string kind = outline.exactly_one(with({"around"}, shape_keys), "shape");
    if (kind.empty()) return;
    if (kind != "around") {
        if (const auto shape = read_shape(outline)) laminate.outline = *shape;
        return;
    }
    const toml::table* around_table = outline.table("around");
    if (around_table == nullptr) return;
    Fields around(*around_table, what, context, {"metal", "margin"});
    const AroundMetal followed{around.need_text("metal", "\"band\""),
                               around.need("margin", kinds::length, ranges::not_negative_length)};
    if (around.has("metal")) reading.around.push_back({followed.metal, laminate.name, around.where("metal")});
    laminate.outline = followed;
}

void read_openings(Fields& fields, Laminate& laminate) {
    const toml::array* list = fields.list("openings");
    if (list == nullptr) return;
    for (std::size_t i = 0; i < list->size(); ++i) {
        const auto shape =
            read_shape_table((*list)[i], fmt::format("opening {} of {}", i + 1, fields.what()), fields.context());
        if (shape) laminate.openings.push_back(*shape);
    }
}

void read_laminate(Fields& fields, Reading& reading) {
    Laminate laminate;
    laminate.where = fields.where();
    laminate.name = fields.need_text("name", "\"board\"");
    laminate.top_m = fields.need("top", kinds::length, ranges::coordinate);
    laminate.thickness_m = fields.need("thickness", kinds::length, ranges::positive_length);
    reading.faces[laminate.name] = {laminate.top_m, laminate.bottom_m()};
    read_permittivity(fields, laminate);
    laminate.loss_tangent = fields.number("loss_tangent", kinds::number, {0, 1}, 0);
    laminate.permittivity_z = fields.optional("permittivity_z", kinds::number, permittivity_range);
    read_outline(fields, laminate, reading);
    read_openings(fields, laminate);
    if (!reading.omitted(laminate.name)) reading.model.laminates.push_back(std::move(laminate));
}

double read_plane(Fields& fields, Reading& reading) {
    const std::string key = fields.exactly_one({"on", "plane"}, "plane",
                                               "add on = \"board.top\", a face of a laminate, or plane = \"0 mm\"");
    if (key.empty()) return nan;
    if (key == "on") return read_face(*fields.get("on"), fields.named("on"), reading);
    return fields.need("plane", kinds::length, ranges::coordinate);
}

void read_metal(Fields& fields, std::size_t index, Reading& reading) {
    const std::size_t before = reading.faults().count();
    Metal metal;
    metal.where = fields.where();
    metal.name = fields.text("name", fmt::format("metal {}", index + 1));
    metal.plane_m = read_plane(fields, reading);
    metal.cut = fields.flag("cut");
    if (metal.cut) {
        fields.refuse({"material", "conductivity", "thickness", "roughness"}, "on a cut, which takes metal away",
                      "remove it, or remove cut = true");
    } else {
        metal.conductor = read_conductor(fields, true);
        reading.metal_names.insert(metal.name);
    }
    if (const auto shape = read_shape(fields)) metal.shape = *shape;
    if (reading.faults().count() != before) reading.metals_faulty = true;
    reading.model.metals.push_back(std::move(metal));
}

// "board.top", but not "0.5 mm": a face is a name, a point and a word.
bool is_face(const std::string& text) {
    const auto point = text.rfind('.');
    return point != std::string::npos && point > 0 && is_identifier(text.substr(point + 1)) &&
           !std::isdigit(static_cast<unsigned char>(text[0]));
}

}  // namespace

double read_face(const toml::node& node, const std::string& what, Reading& reading) {
    const auto* string = node.as_string();
    if (string == nullptr || !is_face(string->get())) {
        reading.faults().add(position_of(node), fmt::format("{} must be a face of a laminate", what),
                             "write it as \"board.top\" or \"board.bottom\", or give plane = \"0 mm\"");
        return nan;
    }
    const auto point = string->get().rfind('.');
    const std::string name = string->get().substr(0, point), face = string->get().substr(point + 1);
    const auto found = reading.faces.find(name);
    if (found == reading.faces.end()) {
        std::vector<std::string> names;
        for (const auto& entry : reading.faces) names.push_back(entry.first);
        const std::string near = nearest(name, names);
        reading.faults().add(position_of(node), fmt::format("{}: there is no laminate '{}'", what, name),
                             !near.empty()   ? fmt::format("did you mean '{}'?", near)
                             : names.empty() ? "the model has no [[laminate]]; give plane = \"0 mm\" instead"
                                             : fmt::format("laminates are {}", fmt::join(names, ", ")));
        return nan;
    }
    if (face != "top" && face != "bottom") {
        reading.faults().add(position_of(node), fmt::format("{}: laminate '{}' has no face '{}'", what, name, face),
                             "faces are top and bottom");
        return nan;
    }
    return face == "top" ? found->second.top_m : found->second.bottom_m;
}

double read_height(const toml::node& node, const std::string& what, Reading& reading) {
    if (const auto* string = node.as_string(); string != nullptr && is_face(string->get()))
        return read_face(node, what, reading);
    return reading.context.quantity(node, what, kinds::length, ranges::coordinate);
}

Conductor read_conductor(Fields& fields, bool foil) {
    Conductor conductor;
    Context& context = fields.context();
    if (fields.has("material") && fields.has("conductivity")) {
        context.faults.add(fields.where("conductivity"),
                           fmt::format("{} has both a material and a conductivity", fields.what()), "keep one of them");
    }
    conductor.name = fields.text("material", "copper");
    if (const auto material = find_material(conductor.name)) {
        conductor.conductivity_s_per_m = material->conductivity_s_per_m;
    } else if (fields.has("material") && fields.get("material")->is_string()) {
        const std::string near = nearest(conductor.name, material_names());
        context.faults.add(fields.where("material"), fmt::format("unknown material '{}'", conductor.name),
                           near.empty() ? fmt::format("known are {}; or give conductivity = \"5.8e7 S/m\"",
                                                      fmt::join(material_names(), ", "))
                                        : fmt::format("did you mean '{}'?", near));
    }
    if (const toml::node* node = fields.get("conductivity")) {
        const bool perfect = node->value_or(std::string()) == "perfect";
        conductor.name = perfect ? "perfect" : "conductivity";
        conductor.conductivity_s_per_m =
            perfect ? unlimited : context.quantity(*node, fields.named("conductivity"), kinds::conductivity, {1, 1e12});
    }
    conductor.thickness_m = foil ? fields.number("thickness", kinds::length, {1e-9, 0.1}, usual_foil_m) : 0;
    conductor.roughness_rms_m = fields.number("roughness", kinds::length, {0, 1e-3}, 0);
    return conductor;
}

void read_laminates(Reading& reading) {
    Names names("laminate", reading.faults());
    for_each_table(reading, "laminate", [&](const toml::table& table, std::size_t index) {
        Fields fields(table, item_label("laminate", table, index), reading.context,
                      {"name", "top", "thickness", "permittivity", "permittivity_at", "permittivity_z", "loss_tangent",
                       "outline", "openings"});
        names.add(table["name"].value_or(std::string()), fields.where());
        reading.omittable.insert(table["name"].value_or(std::string()));
        read_laminate(fields, reading);
    });
}

void read_metals(Reading& reading) {
    Names names("metal", reading.faults());
    for_each_table(reading, "metal", [&](const toml::table& table, std::size_t index) {
        const std::string name = table["name"].value_or(fmt::format("metal {}", index + 1));
        names.add(name, position_of(table));
        reading.omittable.insert(name);
        if (reading.omitted(name)) return;
        Fields fields(
            table, item_label("metal", table, index), reading.context,
            with({"name", "on", "plane", "cut", "material", "conductivity", "thickness", "roughness"}, shape_keys),
            {"edge"});
        read_metal(fields, index, reading);
    });
}

void read_vias(Reading& reading) {
    Names names("via", reading.faults());
    for_each_table(reading, "via", [&](const toml::table& table, std::size_t index) {
        Via via;
        via.name = table["name"].value_or(fmt::format("via {}", index + 1));
        names.add(via.name, position_of(table));
        reading.omittable.insert(via.name);
        if (reading.omitted(via.name)) return;
        Fields fields(table, item_label("via", table, index), reading.context,
                      {"name", "at", "diameter", "from", "to"});
        via.name = fields.text("name", via.name);
        via.where = fields.where();
        via.at = fields.need_point2("at").value_or(Vec2{0, 0});
        via.diameter_m = fields.need("diameter", kinds::length, ranges::positive_length);
        const toml::node* from = fields.need("from", "\"board.top\"");
        const toml::node* to = fields.need("to", "\"board.bottom\"");
        via.from_m = from == nullptr ? nan : read_height(*from, fields.named("from"), reading);
        via.to_m = to == nullptr ? nan : read_height(*to, fields.named("to"), reading);
        if (std::abs(via.from_m - via.to_m) < 1e-9) {
            reading.faults().add(fields.where("to"),
                                 fmt::format("{} has no length: it begins and ends at {}", fields.what(),
                                             to_text(via.to_m, kinds::length.dimension)));
        }
        reading.model.vias.push_back(via);
    });
}

}  // namespace annulet
