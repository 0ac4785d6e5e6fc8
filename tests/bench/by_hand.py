"""The same work by hand: runs of the ngspice program on the whole board's deck."""

import re
import subprocess

NUMBER = r"[-+]?\d\.\d+e[-+]\d+"
ROW = re.compile(rf"^\d+\t({NUMBER})\t({NUMBER})", re.MULTILINE)


def with_analysis(netlist, pins, analysis):
    """The deck that somebody writes who adds a sweep to the board's netlist: nothing but the pins is kept and printed."""
    prints = "".join(f".save v({pin})\n.print dc v({pin})\n" for pin in pins)
    extra = f"{analysis}\n{prints}.end\n"
    assert netlist.endswith(".end\n")
    return netlist[:-len(".end\n")] + extra


def sweep_deck(netlist, pin, element, first, last, points):
    """One `.dc` line over the element's resistance; half a step more, or the simulator may lose the last point."""
    low, high = sorted((first, last))
    step = (high - low) / (points - 1)
    return with_analysis(netlist, [pin], f".dc {element} {low!r} {high + step / 2!r} {step!r}")


def point_deck(netlist, pin, element, ohms):
    """One operating point. A `.dc` line of one point prints less than `.op`, which lists every device."""
    changed, count = re.subn(rf"^({element} \S+ \S+) \S+$", rf"\1 {ohms!r}", netlist, flags=re.MULTILINE)
    assert count == 1
    return with_analysis(changed, [pin], ".dc V1 3.3 3.3 1")


def all_at_once_deck(netlist, pins, betas, first, last, points):
    """What an expert writes: every thermistor an expression of the temperature, and one sweep of it for all pins."""
    for element, beta in betas.items():
        law = f"r='10k*exp({beta}*(1/(temper+273.15)-1/298.15))'"
        netlist = re.sub(rf"^({element} \S+ \S+) \S+$", rf"\1 {law}", netlist, flags=re.MULTILINE)
    step = (last - first) / (points - 1)
    return with_analysis(netlist, pins, f".dc temp {first!r} {last + step / 2!r} {step!r}")


def run(deck_path, check=True):
    """Runs one deck; its output goes to a pipe and is not looked at."""
    return subprocess.run(["ngspice", "-b", str(deck_path)], stdout=subprocess.PIPE, stderr=subprocess.DEVNULL, text=True,
                          check=check).stdout


def printed(output):
    """The table that `.print dc` makes, as (swept value, volts)."""
    return [(float(x), float(volts)) for x, volts in ROW.findall(output)]
