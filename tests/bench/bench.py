#!/usr/bin/env python3
"""Measures the program against the same work by hand and prints one table. Argument: the release build's folder."""

import json
import os
import statistics
import subprocess
import sys
import tempfile
import time
from pathlib import Path

import boards
import by_hand

INPUTS = 50
OTHERS = 2000
ROUNDS = 5
SAMPLED_RUNS = 40
SAME_VOLTS = 1e-6  # by hand prints seven digits
SIZES = (10_000, 100_000, 1_000_000)
COMPARED_SIZE = 100_000


def median_seconds(work, rounds=ROUNDS):
    return statistics.median(seconds(work) for _ in range(rounds))


def medians_in_turns(*works):
    """The machine's clock and load wander: in turns, all works have the same share of it."""
    rounds = [[seconds(work) for work in works] for _ in range(ROUNDS)]
    return [statistics.median(times) for times in zip(*rounds)]


def seconds(work):
    begin = time.perf_counter()
    work()
    return time.perf_counter() - begin


def check(condition, message):
    if not condition:
        sys.exit(f"bench: {message}")


class Audit:
    """The whole program on the board of dividers."""

    def __init__(self, build, folder):
        self.netlist, sheet = boards.dividers_board(INPUTS, OTHERS)
        self.board = folder / "board.cir"
        self.board.write_text(self.netlist)
        (folder / "board.tap.toml").write_text(sheet)
        self.json = folder / "out.json"
        self.command = [str(build / "bin" / "tapspan"), "audit", str(self.board), "--json", str(self.json)]

    def run(self):
        status = subprocess.run(self.command, stdout=subprocess.DEVNULL, check=False).returncode
        check(status in (0, 1), f"tapspan ended with status {status}")

    def inputs(self):
        """The audited inputs of a run's report, in the order of their dividers."""
        self.run()
        inputs = json.loads(self.json.read_text())["boards"][0]["inputs"]
        inputs.sort(key=lambda one: int(one["net"].removeprefix("ADC_")))
        check(len(inputs) == INPUTS and all(one["audited"] for one in inputs), "not all inputs were audited")
        check(all(len(one["sweep"]["points"]) == boards.POINTS for one in inputs), "a sweep has not all its points")
        return inputs


class ByHand:
    """The decks of both ways by hand, and whether they give our volts."""

    def __init__(self, netlist, inputs, folder):
        self.sweeps = [folder / f"sweep_{i}.cir" for i in range(len(inputs))]
        self.all_at_once = folder / "all_at_once.cir"
        self.points = [folder / f"point_{i}.cir" for i in range(SAMPLED_RUNS)]
        for path, one in zip(self.sweeps, inputs):
            points = one["sweep"]["points"]
            path.write_text(by_hand.sweep_deck(netlist, one["net"], one["divider"]["sensor"], points[0]["sensor_ohms"],
                                               points[-1]["sensor_ohms"], len(points)))
        self.sampled = [(one, one["sweep"]["points"][i * 37 % boards.POINTS])
                        for i, one in enumerate(inputs[j * len(inputs) // SAMPLED_RUNS] for j in range(SAMPLED_RUNS))]
        for path, (one, point) in zip(self.points, self.sampled):
            path.write_text(by_hand.point_deck(netlist, one["net"], one["divider"]["sensor"], point["sensor_ohms"]))
        self.all_at_once.write_text(by_hand.all_at_once_deck(
            netlist, [one["net"] for one in inputs], {f"RT{i}": boards.beta(i) for i in range(1, len(inputs) + 1)},
            boards.COLDEST, boards.HOTTEST, boards.POINTS))

    def check_volts(self, inputs):
        for path, one in zip(self.sweeps, inputs):
            rows = by_hand.printed(by_hand.run(path))
            ends = sorted((one["sweep"]["points"][0], one["sweep"]["points"][-1]), key=lambda point: point["sensor_ohms"])
            check(len(rows) == boards.POINTS, f"{path}: {len(rows)} points by hand")
            for row, end in zip((rows[0], rows[-1]), ends):
                same_volts(path, row[1], end["pin_volts"])
            for (_, volts), ohms in zip(rows, evenly(ends[0]["sensor_ohms"], ends[1]["sensor_ohms"])):
                same_volts(path, volts, one_port_volts(one["divider"], ohms))
        for path, (_, point) in zip(self.points, self.sampled):
            same_volts(path, by_hand.printed(by_hand.run(path))[0][1], point["pin_volts"])
        rows = by_hand.printed(by_hand.run(self.all_at_once))
        points = [point for one in inputs for point in one["sweep"]["points"]]
        check(len(rows) == len(points), f"{self.all_at_once}: {len(rows)} points by hand")
        for (_, volts), point in zip(rows, points):
            same_volts(self.all_at_once, volts, point["pin_volts"])

    def run_sweeps(self):
        for path in self.sweeps:
            by_hand.run(path)

    def run_points(self):
        for path in self.points:
            by_hand.run(path)


def same_volts(path, theirs, ours):
    check(abs(theirs - ours) <= SAME_VOLTS, f"{path}: {theirs} V by hand, {ours} V by tapspan")


def evenly(first, last):
    return [first + i * (last - first) / (boards.POINTS - 1) for i in range(boards.POINTS)]


def one_port_volts(divider, ohms):
    """The report's three numbers of a divider at any sensor resistance (the sense path carries no current here)."""
    source = divider["source_ohms"]
    return divider["open_volts"] + (divider["short_volts"] - divider["open_volts"]) * source / (source + ohms)


def google_benchmark(command, folder, repetitions, *options):
    """Runs a benchmark program; gives its single repetitions by name, in the order of their run."""
    out = folder / "benchmark.json"
    environment = dict(os.environ, SPICE_SCRIPTS=str(folder / "scripts"))
    subprocess.run([*map(str, command), f"--benchmark_out={out}", f"--benchmark_repetitions={repetitions}", *options],
                   cwd=folder, env=environment, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL, check=True)
    runs = {}
    for run in json.loads(out.read_text())["benchmarks"]:
        check(not run.get("error_occurred"), f"{run['name']}: {run.get('error_message')}")
        if run["run_type"] == "iteration":
            runs.setdefault(run["name"].split("/")[0], []).append(run)
    return runs


def measure_audit(build, folder):
    audit = Audit(build, folder)
    inputs = audit.inputs()
    hand = ByHand(audit.netlist, inputs, folder)
    hand.check_volts(inputs)
    ours, sweeps, at_once = medians_in_turns(audit.run, hand.run_sweeps, lambda: by_hand.run(hand.all_at_once))
    all_points = INPUTS * boards.POINTS
    points = seconds(hand.run_points) * all_points / SAMPLED_RUNS
    ours_again = median_seconds(audit.run)
    name = f"`tapspan audit --json`, whole program: {INPUTS} inputs, {boards.POINTS} points each, {OTHERS:,} other elements"
    return [Row(name, ms(ours), f"`ngspice -b` once a divider with a `.dc` line: {INPUTS} runs, one after another", ms(sweeps),
                sweeps / ours, faster(sweeps / ours, 20)),
            Row(name, ms(ours_again), f"`ngspice -b` once a point: {all_points:,} runs, scaled from {SAMPLED_RUNS}", ms(points),
                points / ours_again, faster(points / ours_again, 500)),
            Row(name, ms(ours), "one `ngspice -b`, every thermistor written as an expression of `temper` by an expert",
                ms(at_once), at_once / ours, "none: to compare")]


def measure_reading(build, folder):
    program = build / "tests" / "bench" / "reading_bench"
    per_element = []
    rows = []
    for size in SIZES:
        path = folder / f"flat_{size}.cir"
        path.write_text(boards.flat_netlist(size))
        ours, theirs = reading_times(program, path, size, folder)
        per_element.append(1e9 * statistics.median(ours["text in memory"]) / size)
        if theirs:
            load = statistics.median(theirs)
            rows = [reading_row(size, how, statistics.median(times), load) for how, times in ours.items()]
    small, middle, large = per_element
    growth = Row(f"growth: an element of {SIZES[2]:,}, text in memory", f"{large:.0f} ns",
                 f"an element of {SIZES[0]:,} (of {SIZES[1]:,}: {middle:.0f} ns)", f"{small:.0f} ns", large / small,
                 "near 1: linear")
    return rows + [growth]


def reading_times(program, path, size, folder):
    """Seconds of our readings by how they were done, and of the simulator's loading in turns with them (one size only)."""
    ours = {"text in memory": [], "file from disk": [], "file from disk, the first reading of a fresh process": []}
    theirs = []
    for _ in range(ROUNDS):
        runs = google_benchmark([program, path], folder, 3)
        check(all(run["elements"] == size for run in runs["from_disk"]), f"not all of {size} elements were read")
        memory, disk = ([run["real_time"] / 1e9 for run in runs[name]] for name in ("from_memory", "from_disk"))
        for times, new in zip(ours.values(), (memory, disk[1:], disk[:1])):
            times += new
        if size == COMPARED_SIZE:
            theirs.append(load_seconds(path, folder))
    return ours, theirs


def reading_row(size, how, ours, theirs):
    return Row(f"{size:,} elements, text to flat circuit, {how}", ms(ours),
               "`ngspice -b` loads the same file, less its start on a one-resistor deck", ms(theirs), theirs / ours,
               faster(theirs / ours, 20, 8))


def load_seconds(path, folder):
    """What the program needs for a deck without analysis beyond what it needs for one with a single resistor."""
    tiny = folder / "tiny.cir"
    tiny.write_text("tiny\nR1 a 0 1k\n.end\n")
    return seconds(lambda: by_hand.run(path, check=False)) - median_seconds(lambda: by_hand.run(tiny, check=False), 3)


def measure_sweep(build, folder):
    runs = google_benchmark([build / "tests" / "bench" / "sweep_bench"], folder, 31, "--benchmark_min_time=0.1",
                            "--benchmark_enable_random_interleaving=true")
    times = {name: statistics.median(1 / run["items_per_second"] for run in part) for name, part in runs.items()}
    ratio = times["session"] / times["bare_library"]
    writing = ms(times["deck_text"])
    return [Row(f"one sweep through the session: {boards.POINTS} points, 4 branches (writing its deck: {writing})",
                ms(times["session"]), "the bare library: load, `op`, read, forget the same deck", ms(times["bare_library"]),
                ratio, under(ratio, 1.3))]


class Row:
    """One line of the table."""

    def __init__(self, what, ours, against, theirs, ratio, aim):
        shown = f"{ratio:.0f}" if ratio >= 100 else f"{ratio:.1f}" if ratio >= 10 else f"{ratio:.2f}"
        self.cells = [what, ours, against, theirs, shown, aim]


def faster(ratio, aim, least=None):
    """What a speed-up should be, and whether it is."""
    wanted = f"{aim}" if least is None else f"{aim}, at least {least}"
    met = "met" if ratio >= aim else "at least met" if least is not None and ratio >= least else "missed"
    return f"{wanted}: {met}"


def under(ratio, aim):
    return f"under {aim}: {'met' if ratio < aim else 'missed'}"


def ms(value):
    milliseconds = 1000 * value
    return f"{milliseconds:,.0f} ms" if milliseconds >= 100 else f"{milliseconds:.3g} ms"


def print_table(rows):
    print("| measured | ours | against | theirs | ratio | aim |\n|---|---:|---|---:|---:|---|")
    for row in rows:
        print("| " + " | ".join(row.cells) + " |")


def main():
    build = Path(sys.argv[1]).resolve()
    with tempfile.TemporaryDirectory(prefix="tapspan-bench-") as name:
        folder = Path(name)
        (folder / "scripts").mkdir()
        (folder / ".spiceinit").touch()
        os.chdir(folder)  # the simulator reads an empty start-up file here, and nobody's own
        rows = measure_audit(build, folder) + measure_reading(build, folder) + measure_sweep(build, folder)
    print_table(rows)


if __name__ == "__main__":
    main()
