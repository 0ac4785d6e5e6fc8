"""Invented boards: texts of netlists, the same at every run."""

import random

POINTS = 101
COLDEST, HOTTEST = -20, 80


def beta(i):
    """Of thermistor RT<i>, whose r25 is 10k."""
    return 3400 + 10 * i


def dividers_board(inputs, others):
    """A board with `inputs` dividers and at least `others` R and C that are joined to none of them but through rails.

    Returns the netlist and its declarations.
    """
    lines = ["Invented board: many thermistors and everything else that a board carries", "V1 +3V3 0 3.3", "V2 +5V 0 5"]
    sheet = ["[converter.ADC]", "bits = 12", 'high = "+3V3"', 'inputs = ["ADC_*"]', f"expect_inputs = {inputs}"]
    for i in range(1, inputs + 1):
        lines += [f"R{i} +3V3 TAP_{i} {4.7 + 0.1 * (i % 50):.1f}k", f"RT{i} TAP_{i} 0 10k",
                  f"RS{i} TAP_{i} ADC_{i} 1k", f"CF{i} ADC_{i} 0 100n"]
        sheet += [f"[sensor.RT{i}]", 'kind = "ntc"', 'r25 = "10k"', f"beta = {beta(i)}", f"from = {COLDEST}", f"to = {HOTTEST}"]
    for i in range(1, others // 5 + 1):
        a, b = f"STAGE{i}_A", f"STAGE{i}_B"
        lines += [f"R{5000 + 3 * i} +5V {a} {1 + i % 47}k", f"R{5001 + 3 * i} {a} {b} {10 + i % 89}k",
                  f"R{5002 + 3 * i} {b} 0 {2 + i % 31}k", f"C{5000 + 2 * i} {a} 0 100n", f"C{5001 + 2 * i} {b} 0 {1 + i % 9}n"]
    return "\n".join(lines + [".end", ""]), "\n".join(sheet + [""])


def flat_netlist(elements):
    """`elements` resistors and capacitors, three pins a net. Nets join neighbours, as on a drawn sheet. Deterministic."""
    draw = random.Random(elements)
    nets = [f"{draw.choice(NET_WORDS)}_{i}" for i in range(-(-2 * elements // 3))]
    pins = sorted((i for i in range(len(nets)) for _ in range(3)), key=lambda i: i + REACH * draw.random())
    lines = ["Invented netlist of resistors and capacitors"]
    for i in range(elements):
        kind, values = ("C", FARADS) if i % 5 >= 3 else ("R", OHMS)
        lines.append(f"{kind}{i + 1} {nets[pins[2 * i]]} {nets[pins[2 * i + 1]]} {draw.choice(values)}")
    return "\n".join(lines + [".end", ""])


REACH = 40  # nets that are drawn so near each other that an element may join them
NET_WORDS = ("NODE", "FILT_IN", "AMP_OUT", "BIAS", "SENSE_P", "N", "REF_BUF", "CH_A", "LED_K", "GATE")
OHMS = ("10k", "4.7k", "100", "1meg", "22", "330k", "49.9", "1k", "2.2k", "0.1")
FARADS = ("100n", "10u", "1n", "22p", "4.7u", "470p")
