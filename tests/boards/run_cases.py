#!/usr/bin/env python3
"""Runs the whole-program cases of this folder (see README.md) with a built tapspan."""
import argparse
import json
import math
import pathlib
import re
import subprocess
import sys
import tempfile

import jsonschema

SECTION = re.compile(r"^--- (netlist|declarations|expect|file .+)$")


class Failure(Exception):
    pass


def read_case(path):
    """The story and the sections of a case file."""
    sections, name = {"story": []}, "story"
    # Bytes beyond UTF-8 are part of some netlists: they travel as surrogates.
    for line in path.read_text(encoding="utf-8", errors="surrogateescape").split("\n"):
        match = SECTION.match(line)
        if match:
            name = match.group(1)
            sections[name] = []
        else:
            sections[name].append(line)
    if "netlist" not in sections or "expect" not in sections:
        raise Failure("a case needs a netlist and an expect section")
    return sections


def close(got, wanted, margin):
    return isinstance(got, (int, float)) and not math.isnan(got) and abs(got - wanted) <= margin


def dig(value, path):
    for key in path.split("."):
        if not isinstance(value, dict) or key not in value:
            return None
        value = value[key]
    return value


class Run:
    """One run of the program on one case."""

    def __init__(self, options, sections):
        self.options, self.sections = options, sections
        self.folder = tempfile.TemporaryDirectory()
        self.root = pathlib.Path(self.folder.name)
        self.write("board.cir", sections["netlist"])
        if "declarations" in sections:
            self.write("board.tap.toml", sections["declarations"])
        for name, lines in sections.items():
            if name.startswith("file "):
                self.write(name[5:], lines)
        self.expect = [line.strip() for line in sections["expect"] if line.strip() and not line.startswith("#")]
        self.args = [word for line in self.expect if line.startswith("args ") for word in line.split()[1:]]

    def write(self, name, lines):
        text = "\n".join(lines).rstrip("\n") + "\n"
        path = self.root / name
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_bytes(text.encode("utf-8", errors="surrogateescape"))

    def program(self, *more):
        command = [self.options.tapspan, "audit", "board.cir", *self.args, *more]
        return subprocess.run(command, cwd=self.root, capture_output=True, timeout=120, check=False)

    def check(self):
        text = self.program("--jobs", "1")
        self.text, self.stderr, self.status = text.stdout.decode(errors="replace"), text.stderr.decode(errors="replace"), text.returncode
        first = self.program("--json", "-", "--jobs", "1")
        second = self.program("--json", "-", "--jobs", "2")
        if first.stdout != second.stdout:
            raise Failure("--jobs 1 and --jobs 2 write different reports")
        if first.returncode != self.status:
            raise Failure(f"status {self.status} with text, {first.returncode} with JSON")
        self.report = json.loads(first.stdout)
        jsonschema.validate(self.report, self.options.schema_document)
        self.board = self.report["boards"][0]
        self.inputs = {entry["net"]: entry for entry in self.board["inputs"]}
        self.check_engines()
        for line in self.expect:
            self.check_line(line)

    def check_engines(self):
        for entry in self.inputs.values():
            gap = entry.get("figures", {}).get("engine_gap_lsb")
            if gap is None:
                continue
            volts = gap * (entry["high"] - entry["low"]) / 2 ** entry["bits"] if "high" in entry else 0
            if not volts <= 1e-9:
                raise Failure(f"{entry['net']}: ngspice and the closed form are {volts} V apart")

    def check_line(self, line):
        for pattern, action in self.ACTIONS:
            match = re.fullmatch(pattern, line)
            if match:
                try:
                    action(self, *match.groups())
                except Failure as failure:
                    raise Failure(f"{line}\n      {failure}") from None
                return
        raise Failure(f"no such check: {line}")

    def input(self, net):
        if net not in self.inputs:
            raise Failure(f"no input {net}; there are {', '.join(self.inputs) or 'none'}")
        return self.inputs[net]

    def compare(self, got, wanted, margin):
        wanted = json.loads(wanted)
        if margin is not None:
            if not close(got, wanted, float(margin)):
                raise Failure(f"got {got}")
        elif got != wanted:
            raise Failure(f"got {json.dumps(got)}")

    def on_status(self, wanted):
        if self.status != int(wanted):
            raise Failure(f"got {self.status}\n{self.stderr}{self.text}")

    def on_args(self, _):
        pass

    def on_inputs(self, names):
        if list(self.inputs) != names.split():
            raise Failure(f"got {' '.join(self.inputs)}")

    def compare_findings(self, findings, wanted):
        got = ", ".join(f"{f['rule']} {f['level']}" for f in findings) or "none"
        if got != wanted:
            raise Failure(f"got {got}" + "".join(f"\n        {f['message']}" for f in findings))

    def on_findings(self, net, wanted):
        self.compare_findings(self.input(net)["findings"], wanted)

    def on_board_findings(self, wanted):
        self.compare_findings(self.board["findings"], wanted)

    def on_absent(self, net, path):
        if dig(self.input(net), path) is not None:
            raise Failure(f"got {dig(self.input(net), path)}")

    def on_value(self, net, path, wanted, margin=None):
        self.compare(dig(self.input(net), path), wanted, margin)

    def on_board_value(self, path, wanted):
        self.compare(dig(self.board, path), wanted, None)

    def on_point(self, net, at, key, wanted, margin=None):
        points = self.input(net)["sweep"]["points"]
        nearest = min(points, key=lambda point: abs(point["at"] - float(at)))
        if abs(nearest["at"] - float(at)) > 1e-9 * max(1, abs(float(at))):
            raise Failure(f"no point at {at}; the nearest is at {nearest['at']}")
        self.compare(nearest.get(key), wanted, margin)

    def on_message(self, net, rule, wanted):
        findings = self.board["findings"] if net == "board" else self.input(net)["findings"]
        messages = [f["message"] for f in findings if f["rule"] == rule]
        if not any(wanted in message for message in messages):
            raise Failure("got " + ("\n        ".join(messages) or "no such finding"))

    def on_stderr(self, wanted):
        if wanted not in self.stderr:
            raise Failure(f"got {self.stderr}")

    def on_stderr_empty(self):
        if self.stderr:
            raise Failure(f"got {self.stderr}")

    def on_text(self, wanted):
        if wanted not in self.text:
            raise Failure(f"got {self.text}")

    # A second simulator. Node and element names become numbers: its reader takes fewer characters than boards use.
    def on_gnucap(self, net):
        entry = self.input(net)
        points = entry["sweep"]["points"]
        for point in (points[0], points[len(points) // 2], points[-1]):
            volts = self.second_simulator(entry, point)
            if not abs(volts - point["pin_volts"]) <= 1e-6 * max(abs(volts), 1e-6):
                raise Failure(f"at {point['at']} it finds {volts}, the report has {point['pin_volts']}")

    def second_simulator(self, entry, point):
        nodes, deck = {"0": "0", "gnd": "0"}, ["second simulator"]

        def node(name):
            return nodes.setdefault(name.lower(), str(len(nodes)))

        sensor = entry["divider"]["sensor"].lower()
        for number, line in enumerate(self.sections["netlist"][1:]):
            words = re.split(r"\s+", line.split(";")[0].strip())
            letter = words[0][:1].lower()
            if letter in ("", "*", ".", "c", "j"):
                continue
            if letter not in "rviegt" or len(words) < 4:
                raise Failure(f"cannot hand this card to the second simulator: {line}")
            ends = 4 if letter in "eg" else 2
            value = words[-1]
            if words[0].lower() == sensor:
                letter, value = "r", repr(point["sensor_ohms"])
            if letter == "v" and words[1].lower() == sensor:
                value = repr(point["at"])
            deck.append(" ".join([f"{letter}{number + 1}", *[node(word) for word in words[1:1 + ends]], value]))
        deck += [".options numdgt=12", f".print op v({node(entry['net'])})", ".op", ".end"]
        path = self.root / "second.ckt"
        path.write_text("\n".join(deck) + "\n")
        out = subprocess.run([self.options.gnucap, "-b", path], capture_output=True, text=True, timeout=60, check=False).stdout
        rows = [line.split() for line in out.splitlines()]
        numbers = [row for row in rows if len(row) == 2 and re.fullmatch(r"[-+0-9.]+", row[0])]
        if not numbers:
            raise Failure(f"the second simulator printed no number:\n{out}")
        return number_of(numbers[-1][1])

    ACTIONS = [
        (r"status (\d)", on_status),
        (r"args (.+)", on_args),
        (r"inputs (.+)", on_inputs),
        (r"findings (\S+): (.+)", on_findings),
        (r"board findings: (.+)", on_board_findings),
        (r"board (\S+) = (.+)", on_board_value),
        (r"(\S+) message (\S+) has \"(.+)\"", on_message),
        (r"(\S+) at (\S+): (\S+) = (\S+)(?: \+- (\S+))?", on_point),
        (r"(\S+) (\S+) absent", on_absent),
        (r"(\S+) (\S+) = (.+?)(?: \+- (\S+))?", on_value),
        (r"stderr has \"(.+)\"", on_stderr),
        (r"stderr is empty", on_stderr_empty),
        (r"text has \"(.+)\"", on_text),
        (r"gnucap (\S+)", on_gnucap),
    ]


def number_of(text):
    """A number as the second simulator prints it: 1.645, 22.K, 4.7Meg, 100.u."""
    scale = {"t": 1e12, "g": 1e9, "meg": 1e6, "k": 1e3, "": 1, "m": 1e-3, "u": 1e-6, "n": 1e-9, "p": 1e-12, "f": 1e-15}
    match = re.fullmatch(r"([-+]?[0-9.]+(?:e[-+]?\d+)?)\s*([a-z]*)", text.lower())
    if not match or match.group(2) not in scale:
        raise Failure(f"cannot read the second simulator's number {text}")
    return float(match.group(1)) * scale[match.group(2)]


def main():
    here = pathlib.Path(__file__).resolve().parent
    parser = argparse.ArgumentParser(description=__doc__)
    parser.add_argument("--tapspan", required=True)
    parser.add_argument("--schema", required=True)
    parser.add_argument("--gnucap", default="gnucap")
    parser.add_argument("--accept", help="print what comes out of this case")
    parser.add_argument("cases", nargs="*", default=sorted(here.glob("*.case")))
    options = parser.parse_args()
    options.tapspan = str(pathlib.Path(options.tapspan).resolve())
    options.schema_document = json.loads(pathlib.Path(options.schema).read_text())
    if options.accept:
        run = Run(options, read_case(pathlib.Path(options.accept)))
        result = run.program()
        sys.stdout.write(result.stderr.decode(errors="replace") + result.stdout.decode(errors="replace"))
        print(f"status {result.returncode}")
        print(json.dumps(json.loads(run.program("--json", "-").stdout), indent=1)[:20000])
        return 0
    failed = 0
    for case in map(pathlib.Path, options.cases):
        try:
            Run(options, read_case(case)).check()
        except (Failure, jsonschema.ValidationError, json.JSONDecodeError, subprocess.TimeoutExpired) as failure:
            failed += 1
            message = failure.message if isinstance(failure, jsonschema.ValidationError) else failure
            print(f"FAILED {case.name}\n    {message}")
    total = len(options.cases)
    print(f"{total - failed} passed, {failed} failed")
    return 1 if failed or not total else 0


if __name__ == "__main__":
    sys.exit(main())
