#!/usr/bin/env python3
"""Writes libsolver/src/study/prove_references.cpp from tests/reference/values.json.

Run it after a change of the values: scripts/prove_references.py
"""
import json
import pathlib

ROOT = pathlib.Path(__file__).resolve().parent.parent
VALUES = json.loads((ROOT / "tests/reference/values.json").read_text())["values"]


def entries(*kinds):
    return [v for v in VALUES if v["kind"] in kinds]


def pair(value):
    return f"{{{value['re']!r}, {value['im']!r}}}"


def poor(entry):
    return str(bool(entry["tolerance"].get("poor_test"))).lower()


def dipole(v):
    g = v["geometry"]
    return f'"tube dipole, Omega {g["Omega"]:g}, {g["L_over_lambda"]:g} wavelengths", {g["L_over_lambda"]!r}, ' \
           f'{g["a_over_lambda"]!r}, {pair(v["value"]["Z_gap_2a"])}, {poor(v)}'


def dipole_resonance(v):
    g, r = v["geometry"], v["value"]
    gap = "0.0" if g["gap"] == "2a" else "1.0 / 41"
    return f'"dipole resonance, length over diameter {g["h_over_a"]:g}, gap {g["gap"]}", {float(g["h_over_a"])!r}, ' \
           f'{gap}, {r["L_over_lambda"]!r}, {r["R"]!r}'


def loop(v):
    g = v["geometry"]
    return f'"wire loop, Omega {g["Omega"]:g}, kb {g["kb"]:g}", {float(g["Omega"])!r}, {g["kb"]!r}, ' \
           f'{g["b_over_lambda"]!r}, {g["a_over_lambda"]!r}, {pair(v["value"]["Z_gap2a"])}, {poor(v)}'


def loop_resonance(v):
    g, r = v["geometry"], v["value"]
    return f'"wire loop resonance, Omega {g["Omega"]:g}", {g["b_over_a"]!r}, {r["kb"]!r}, {r["R"]!r}'


def mutual(v):
    g = v["geometry"]
    x = g.get("spacing_over_lambda", g.get("dx", 0.0))
    z = 0.5 + g["end_gap_over_lambda"] if "end_gap_over_lambda" in g else g.get("dz", 0.0)
    largest = max(abs(complex(e["value"]["re"], e["value"]["im"])) for e in entries(v["kind"]))
    kind = {"mutual_side": "side by side", "mutual_collinear": "collinear", "mutual_echelon": "in echelon"}[v["kind"]]
    return f'"half-wave dipoles {kind}, x {x:g}, z {z:g} wavelengths", {float(x)!r}, {float(z)!r}, ' \
           f'{pair(v["value"])}, {largest!r}'


def monopole(v):
    g = v["geometry"]
    return f'"monopole, {g["h_over_lambda"]:g} wavelengths", {g["h_over_lambda"]!r}, {g["a_over_lambda"]!r}, ' \
           f'{g["b_over_a"]!r}, {pair(v["value"])}'


def inductance(v):
    g = v["geometry"]
    if v["kind"] == "ring_inductance":
        return f'"ring of round wire, b/a {g["b"] / g["a"]:g}", {float(g["b"])!r}, 0.0, {g["a"]!r}, {v["value"] * g["b"]!r}'
    if v["kind"] == "square_inductance":
        s = float(g["side"])
        return f'"square of round wire, side/a {s / g["a"]:g}", {s!r}, {s!r}, {g["a"]!r}, {v["value"] * s!r}'
    return f'"rectangle of round wire, {g["x"]:g} by {g["y"]:g}, a {g["a"]:g}", {float(g["x"])!r}, {float(g["y"])!r}, ' \
           f'{g["a"]!r}, {v["value"]!r}'


def step_up(v):
    g = v["geometry"]
    return f'"folded dipole, radii {g["a_driven"]:g} and {g["a_other"]:g}, spacing {g["spacing"]:g}", ' \
           f'{float(g["a_driven"])!r}, {float(g["a_other"])!r}, {float(g["spacing"])!r}, {v["value"]!r}'


def folded(v):
    g = v["geometry"]
    return f'"folded dipole, {g["L_over_lambda"]:g} wavelengths", {g["L_over_lambda"]!r}, ' \
           f'{g["spacing_over_lambda"]!r}, {g["a_over_lambda"]!r}, {pair(v["value"]["Z_N180"])}'


def capacitance(v):
    if v["kind"] == "cap_square":
        return f'"square plate", -1.0, {v["value"]!r}'
    g = v["geometry"]
    return f'"annulus, radii {g["r_in"]:g} and 1", {g["r_in"]!r}, {v["value"]!r}'


def flat_ring(v):
    g = v["geometry"]
    return f'"flat ring, width {g["width"]:g} of its radius", {g["width"]!r}, {v["value"]!r}'


TABLES = [
    ("Dipole", "dipoles", ["dipole_impedance"], dipole),
    ("DipoleResonance", "dipole_resonances", ["dipole_resonance"], dipole_resonance),
    ("Loop", "loops", ["loop_impedance"], loop),
    ("LoopResonance", "loop_resonances", ["loop_resonance"], loop_resonance),
    ("Mutual", "mutuals", ["mutual_side", "mutual_collinear", "mutual_echelon"], mutual),
    ("Monopole", "monopoles", ["monopole_impedance"], monopole),
    ("Inductance", "inductances", ["ring_inductance", "square_inductance", "rect_inductance"], inductance),
    ("StepUp", "step_ups", ["stepup"], step_up),
    ("Folded", "folded_dipoles", ["folded_dipole"], folded),
    ("Capacitance", "capacitances", ["cap_square", "cap_annulus"], capacitance),
    ("FlatRing", "flat_rings", ["flat_ring_L"], flat_ring),
]


def table(type_name, function, kinds, row):
    rows = "\n".join(f"    {{{row(v)}}}," for v in entries(*kinds))
    return f"constexpr {type_name} {function}_table[] = {{\n{rows}\n}};\n"


def main():
    text = "// Written by scripts/prove_references.py from tests/reference/values.json: change that and run it again.\n"
    text += "// clang-format off\n"
    text += '#include "study/prove_references.hpp"\n\nnamespace annulet::references {\n\nnamespace {\n\n'
    text += "\n".join(table(*t) for t in TABLES)
    text += "\n}  // namespace\n\n"
    for type_name, function, _, _ in TABLES:
        text += f"std::span<const {type_name}> {function}() {{\n    return {function}_table;\n}}\n"
    text += "\n}  // namespace annulet::references\n"
    (ROOT / "libsolver/src/study/prove_references.cpp").write_text(text)


if __name__ == "__main__":
    main()
