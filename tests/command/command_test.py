#!/usr/bin/env python3
"""How the program behaves on the command line, failures included. ANNULET names the program, ANNULET_MODELS the models."""
import csv
import hashlib
import json
import os
import pathlib
import pty
import shutil
import signal
import subprocess
import tempfile
import time
import tomllib
import unittest

PROGRAM = os.environ["ANNULET"]
MODELS = pathlib.Path(os.environ["ANNULET_MODELS"])
RING = MODELS / "river-gauge-868.toml"
PAIR = MODELS / "gauge-pair-868.toml"
FEW = ["--from", "860 MHz", "--to", "880 MHz", "--points", "3", "--in-air"]


class Command(unittest.TestCase):
    def setUp(self):
        self.folder = pathlib.Path(tempfile.mkdtemp(prefix="annulet-command-"))

    def tearDown(self):
        shutil.rmtree(self.folder)

    def run_program(self, *arguments, **options):
        return subprocess.run([PROGRAM, *map(str, arguments)], cwd=self.folder, capture_output=True, text=True,
                              timeout=250, check=False, **options)

    def sweep(self, *arguments, model=RING, **options):
        return self.run_program("sweep", model, *FEW, *arguments, **options)

    def names(self, folder=None):
        return sorted(path.name for path in (folder or self.folder).iterdir())

    def expect_failure(self, result, status, *texts):
        self.assertEqual(result.returncode, status, result.stderr)
        self.assertEqual(result.stdout, "")
        for text in texts:
            self.assertIn(text, result.stderr)
        self.assertEqual(self.names(), [])

    # Results

    def test_sweep_writes_three_files_and_a_summary(self):
        result = self.sweep()
        self.assertEqual(result.returncode, 0, result.stderr)
        self.assertEqual(self.names(), ["river-gauge-868.csv", "river-gauge-868.json", "river-gauge-868.s1p"])
        self.assertEqual(result.stderr, "", "no progress without a terminal")
        for text in ("River-gauge receive loop, 868.3 MHz\n", "Mesh ", "Port 'feed', 50 ohm", "goal ", "VSWR", "residual",
                     "solved in air as asked", "river-gauge-868.s1p\n", "river-gauge-868.json\n"):
            self.assertIn(text, result.stdout)
        self.assertLessEqual(max(map(len, result.stdout.splitlines())), 100)

    def test_check_solves_nothing_and_says_so(self):
        result = self.run_program("check", RING)
        self.assertEqual(result.returncode, 0, result.stderr)
        for text in ("Mesh ", "Memory ", "cells of laminate", "no rules of fabrication are given"):
            self.assertIn(text, result.stdout)
        self.assertEqual(self.names(), [])

    def test_check_fails_on_a_broken_rule(self):
        model = self.folder / "narrow.toml"
        model.write_text((MODELS / "snow-depth-2442.toml").read_text() + '\n[fabrication]\nminimum_slot = "2 mm"\n')
        result = self.run_program("check", model, "--json", "-")
        self.assertEqual(result.returncode, 1, result.stderr)
        found = json.loads(result.stdout)["findings"]
        self.assertEqual([finding["kind"] for finding in found], ["slot"])
        self.assertAlmostEqual(found[0]["measured_m"], 1.5e-3, delta=2e-5)

    def test_draw_writes_one_drawing(self):
        result = self.run_program("draw", RING, "--mesh")
        self.assertEqual(result.returncode, 0, result.stderr)
        self.assertEqual(self.names(), ["river-gauge-868.svg"])
        self.assertIn("P1 feed", (self.folder / "river-gauge-868.svg").read_text())
        self.assertEqual(self.run_program("draw", RING).returncode, 0, "its own file may be replaced")

    def test_json_has_the_agreed_keys_in_their_order(self):
        result = self.sweep("--json", "-")
        self.assertEqual((result.returncode, result.stderr), (0, ""))
        found = json.loads(result.stdout)
        self.assertEqual(list(found)[:6], ["annulet", "command", "model", "parameters", "mesh", "cautions"])
        self.assertEqual(list(found)[-1], "timing_s")
        self.assertEqual(list(found["timing_s"]), ["mesh", "assemble", "factor", "post", "total"])
        self.assertEqual(list(found["mesh"]), ["unknowns", "quadrilaterals", "triangles", "segments", "laminate_cells"])
        self.assertEqual(list(found["model"]), ["title", "file", "sha256"])
        for key in ("frequency_hz", "ports", "reference_ohm", "port", "resonances", "full_solves", "reflection_error"):
            self.assertIn(key, found)
        for key in ("impedance_ohm", "reflection", "return_loss_db", "vswr"):
            self.assertIn(key, found["port"]["feed"])
        self.assertEqual(found["command"], "sweep")
        self.assertEqual(found["model"]["sha256"], hashlib.sha256(RING.read_bytes()).hexdigest())
        self.assertEqual(found["frequency_hz"], [860e6, 870e6, 880e6])
        self.assertEqual(found["full_solves"], 3)
        self.assertGreater(found["mesh"]["unknowns"], 0)
        self.assertEqual(self.names(), [], "a result on standard output leaves no files")

    def test_json_csv_and_touchstone_agree(self):
        self.assertEqual(self.sweep().returncode, 0)
        found = json.loads((self.folder / "river-gauge-868.json").read_text())["port"]["feed"]
        with open(self.folder / "river-gauge-868.csv", newline="", encoding="ascii") as table:
            rows = list(csv.DictReader(table))
        data = [line.split() for line in (self.folder / "river-gauge-868.s1p").read_text().splitlines()
                if line[0] not in "!#"]
        self.assertEqual(len(rows), 3)
        self.assertEqual(len(data), 3)
        for i, (row, point) in enumerate(zip(rows, data)):
            self.assertEqual(float(row["frequency_hz"]), float(point[0]))
            self.assertAlmostEqual(float(row["resistance_ohm"]), found["impedance_ohm"]["real"][i], places=8)
            self.assertAlmostEqual(float(row["vswr"]), found["vswr"][i], delta=1e-9 * found["vswr"][i])
            self.assertAlmostEqual(float(point[1]), found["reflection"]["real"][i], places=10)
            self.assertAlmostEqual(float(point[2]), found["reflection"]["imag"][i], places=10)

    def test_two_ports_give_a_reciprocal_matrix(self):
        result = self.sweep("--json", "pair.json", "--quiet", model=PAIR)
        self.assertEqual((result.returncode, result.stdout, result.stderr), (0, "", ""))
        self.assertEqual(self.names(), ["gauge-pair-868.csv", "gauge-pair-868.s2p", "pair.json"])
        found = json.loads((self.folder / "pair.json").read_text())
        self.assertEqual(found["ports"], ["upstream", "downstream"])
        s = found["s_parameters"]
        for part in ("real", "imag"):
            for there, back in zip(s["upstream"]["downstream"][part], s["downstream"]["upstream"][part]):
                self.assertAlmostEqual(there, back, delta=1e-6)
        self.assertGreater(max(map(abs, s["upstream"]["downstream"]["real"])), 1e-6)

    def expect(self, name, ports):
        """One entry of expected.toml: a model, or a model and ' in air'."""
        model, air, _ = name.partition(" in air")
        result = self.run_program("sweep", MODELS / f"{model}.toml", "--json", "-", "--points", "21",
                                  *(["--in-air"] if air else []))
        self.assertEqual(result.returncode, 0, result.stderr)
        result = json.loads(result.stdout)
        # Poynting: what goes in is radiated or lost (copper, laminate, resistors); two ports are reciprocal.
        for power in result["quality"]["power"]:
            self.assertAlmostEqual(power["power_balance"], 1, delta=1e-4)
        self.assertLess(result["quality"]["port_asymmetry"], 1e-4)
        found = result["resonances"]
        for port, kinds in ports.items():
            for kind, value in kinds.items():
                with self.subTest(model=name, port=port, kind=kind):
                    first = next(r for r in found if (r["port"], r["kind"]) == (port, kind))
                    for quantity, tolerance in (("frequency_hz", "frequency_fraction"),
                                                ("resistance_ohm", "resistance_fraction")):
                        self.assertAlmostEqual(first[quantity], value[quantity],
                                               delta=value[quantity] * value[tolerance])

    def expected(self):
        return tomllib.loads((MODELS / "expected.toml").read_text())

    def test_every_model_has_expected_values(self):
        names = {path.stem for path in MODELS.glob("*.toml") if path.stem != "expected"}
        self.assertEqual(names, {name.partition(" in air")[0] for name in self.expected()})

    def test_models_without_sheets_meet_their_expected_values(self):
        for name, ports in self.expected().items():
            if " in air" in name or "[[laminate]]" not in (MODELS / f"{name}.toml").read_text():
                self.expect(name, ports)

    def test_river_gauge_board_meets_its_expected_values(self):
        self.expect("river-gauge-868", self.expected()["river-gauge-868"])

    def test_snow_depth_board_meets_its_expected_values(self):
        self.expect("snow-depth-2442", self.expected()["snow-depth-2442"])

    def test_prove_passes_and_names_its_sources(self):
        result = self.run_program("prove", "--json", "-")
        self.assertEqual(result.returncode, 0, result.stderr)
        found = json.loads(result.stdout)
        self.assertEqual((found["command"], found["pass"], found["failed"]), ("prove", True, 0))
        self.assertGreater(found["judged"], 100)
        for case in found["cases"]:
            self.assertTrue({"name", "quantity", "reference", "computed", "tolerance", "source", "pass"} <= set(case))
            self.assertTrue(case["source"])
            # What is no outside result is shown and not judged.
            if "not published" in case["source"]:
                self.assertIsNone(case["pass"])

    def test_prove_takes_no_model(self):
        result = self.run_program("prove", MODELS / "monopole-433.toml")
        self.assertEqual((result.returncode, result.stdout), (2, ""))

    def test_quiet_says_nothing_and_writes_all(self):
        result = self.sweep("--quiet")
        self.assertEqual((result.returncode, result.stdout, result.stderr), (0, "", ""))
        self.assertEqual(len(self.names()), 3)

    def test_quiet_with_json_on_standard_output(self):
        result = self.sweep("--quiet", "--json", "-", "--out", "here")
        self.assertEqual((result.returncode, result.stderr), (0, ""))
        self.assertEqual(json.loads(result.stdout)["ports"], ["feed"])
        self.assertEqual(self.names(self.folder / "here"), ["river-gauge-868.csv", "river-gauge-868.s1p"])

    def test_out_makes_its_folders(self):
        self.assertEqual(self.sweep("--out", "a/b").returncode, 0)
        self.assertEqual(len(self.names(self.folder / "a" / "b")), 3)

    def test_set_overrides_a_parameter(self):
        plain = json.loads(self.sweep("--json", "-").stdout)
        changed = json.loads(self.sweep("--json", "-", "--set", "radius=50", "--set", "width=4 mm").stdout)
        # A bare number stays one, in the unit of the keys that use it; one with a unit is in SI.
        self.assertAlmostEqual(plain["parameters"]["radius"], 58.4)
        self.assertAlmostEqual(changed["parameters"]["radius"], 50)
        self.assertAlmostEqual(changed["parameters"]["width"], 0.004)
        self.assertNotEqual(plain["port"]["feed"]["reflection"], changed["port"]["feed"]["reflection"])

    def test_single_frequencies_are_sorted(self):
        result = self.run_program("sweep", RING, "--json", "-", "--at", "900MHz", "--at", "868.3 MHz", "--at", "9e8")
        self.assertEqual(json.loads(result.stdout)["frequency_hz"], [868.3e6, 900e6])

    def test_one_and_two_threads_agree(self):
        one, two = (json.loads(self.sweep("--json", "-", "--threads", n).stdout) for n in (1, 2))
        bound = 100 * 2.3e-16 / one["quality"]["reciprocal_condition"]
        for part in ("real", "imag"):
            for a, b in zip(one["port"]["feed"]["reflection"][part], two["port"]["feed"]["reflection"][part]):
                self.assertAlmostEqual(a, b, delta=bound)

    def test_every_point_is_taken(self):
        self.assertEqual(self.sweep("--every-point", "--quiet").returncode, 0)

    def test_version_names_build_and_compiler(self):
        result = self.run_program("--version")
        self.assertEqual(result.returncode, 0)
        self.assertRegex(result.stdout, r"^annulet \d+\.\d+\.\d+ \(\w+, \w+ [\d.]+\)\n$")

    def test_help_lists_commands_and_options(self):
        self.assertIn("sweep", self.run_program("--help").stdout)
        result = self.run_program("sweep", "--help")
        self.assertEqual(result.returncode, 0)
        for option in ("--json", "--quiet", "--threads", "--set", "--out", "--from", "--to", "--points", "--at", "--force",
                       "--every-point"):
            self.assertIn(option, result.stdout)

    # Faults of usage

    def test_no_command(self):
        self.expect_failure(self.run_program(), 2, "no command given", "see annulet --help")

    def test_mistyped_command_gets_the_nearest(self):
        self.expect_failure(self.run_program("swep", RING), 2, "unknown command 'swep'", "did you mean 'sweep'?")

    def test_strange_command_gets_the_help(self):
        self.expect_failure(self.run_program("hovercraft"), 2, "unknown command 'hovercraft'", "see annulet --help")

    def test_mistyped_option_gets_the_nearest(self):
        self.expect_failure(self.sweep("--thread", "2"), 2, "unknown option '--thread'", "did you mean '--threads'?")
        self.expect_failure(self.sweep("--jason=x"), 2, "unknown option '--jason'", "did you mean '--json'?")

    def test_missing_model(self):
        self.expect_failure(self.run_program("sweep"), 2, "MODEL is required", "see annulet sweep --help")

    def test_bad_option_values(self):
        self.expect_failure(self.sweep("--threads", "0"), 2, "--threads")
        self.expect_failure(self.sweep("--threads", "many"), 2, "--threads")
        self.expect_failure(self.sweep("--at", "868 MHz"), 2, "--at")
        self.expect_failure(self.sweep("--set", "radius"), 2, "--set radius: there is no NAME=VALUE")
        self.expect_failure(self.sweep("--set", "radios=3"), 2, "radios")
        self.expect_failure(self.run_program("sweep", RING, "--points", "-3"), 2, "--points")

    def test_bad_frequencies(self):
        for start, end in (("0", "1 GHz"), ("-5", "1 GHz"), ("2 GHz", "1 GHz"), ("8 mm", "1 GHz"), ("1 GHz", "fast"),
                           ("nan", "1 GHz"), ("1 GHz", "1e999")):
            result = self.run_program("sweep", RING, f"--from={start}", f"--to={end}", "--points", "5")
            self.expect_failure(result, 2, "error: ")

    # Faults of the model and of files

    def test_faults_of_a_model_stand_with_line_and_column(self):
        model = self.folder / "bad.toml"
        model.write_text(RING.read_text().replace("permittivity", "permitivity"))
        result = self.sweep(model="bad.toml")
        self.assertEqual((result.returncode, result.stdout), (2, ""))
        self.assertRegex(result.stderr, r"bad\.toml:\d+:\d+: error: ")
        self.assertIn("permitivity = 4.3", result.stderr)
        self.assertIn("permittivity", result.stderr.replace("permitivity", ""))
        self.assertEqual(self.names(), ["bad.toml"])

    def test_missing_file(self):
        self.expect_failure(self.sweep(model="none.toml"), 4, "cannot read none.toml: there is no such file")

    def test_directory_as_model(self):
        self.expect_failure(self.sweep(model="."), 4, "it is a directory")

    def test_endless_file_as_model(self):
        self.expect_failure(self.sweep(model="/dev/zero"), 4, "it is not a regular file")

    def test_unwritable_folder(self):
        self.expect_failure(self.sweep("--out", "/proc/annulet"), 4, "cannot make the directory /proc/annulet")

    def test_full_standard_output(self):
        with open("/dev/full", "w", encoding="ascii") as full:
            result = subprocess.run([PROGRAM, "sweep", RING, *FEW, "--json", "-"], stdout=full, stderr=subprocess.PIPE,
                                    text=True, check=False)
        self.assertEqual(result.returncode, 4)
        self.assertIn("cannot write to standard output", result.stderr)

    def test_strange_files_are_not_overwritten(self):
        strange = self.folder / "river-gauge-868.csv"
        strange.write_text("a,b\n1,2\n")
        result = self.sweep()
        self.assertEqual((result.returncode, result.stdout), (4, ""))
        self.assertIn("river-gauge-868.csv: a file stands there that annulet did not write (--force", result.stderr)
        self.assertEqual(self.names(), ["river-gauge-868.csv"])
        self.assertEqual(strange.read_text(), "a,b\n1,2\n")
        self.assertEqual(self.sweep("--force").returncode, 0)
        self.assertIn("frequency_hz", strange.read_text())

    def test_own_files_are_overwritten(self):
        self.assertEqual(self.sweep().returncode, 0)
        before = (self.folder / "river-gauge-868.s1p").read_text()
        self.assertEqual(self.sweep("--set", "radius=50").returncode, 0)
        self.assertNotEqual(before, (self.folder / "river-gauge-868.s1p").read_text())

    # The terminal

    def start_on_terminal(self, *arguments):
        """The program with its standard error on a terminal; returns it with the terminal's near end."""
        near, far = pty.openpty()
        process = subprocess.Popen([PROGRAM, *map(str, arguments)], cwd=self.folder, stdout=subprocess.PIPE, stderr=far,
                                   text=True)
        os.close(far)
        return process, near

    @staticmethod
    def read_until(terminal, text, seconds=60):
        seen, end = "", time.monotonic() + seconds
        while text not in seen and time.monotonic() < end:
            try:
                seen += os.read(terminal, 4096).decode()
            except OSError:
                break
        return seen

    def test_interrupt_leaves_no_file(self):
        process, terminal = self.start_on_terminal("sweep", RING, "--points", "300000")
        self.assertIn("solve", self.read_until(terminal, "solve"))
        process.send_signal(signal.SIGINT)
        output, _ = process.communicate(timeout=60)
        self.assertIn("interrupted; nothing was written", self.read_until(terminal, "written"))
        os.close(terminal)
        self.assertEqual((process.returncode, output), (130, ""))
        self.assertEqual(self.names(), [])

    def test_progress_shows_on_a_terminal_only_when_not_quiet(self):
        for quiet in (False, True):
            process, terminal = self.start_on_terminal("sweep", RING, *FEW, *(["--quiet"] if quiet else []))
            process.communicate(timeout=60)
            seen = self.read_until(terminal, "never")
            os.close(terminal)
            self.assertEqual(process.returncode, 0)
            self.assertEqual("mesh" in seen, not quiet)


if __name__ == "__main__":
    unittest.main()
