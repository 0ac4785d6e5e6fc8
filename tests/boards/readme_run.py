#!/usr/bin/env python3
"""The run that the README shows is what the program prints today. Arguments: the program, the project's folder."""

import difflib
import re
import subprocess
import sys
from pathlib import Path


def shown_run(readme):
    """The command line of the indented block that begins with "$ tapspan", and the output below it."""
    block = re.search(r"^    \$ tapspan (.*)\n\n((?:    .*\n|\n)+)", readme, re.MULTILINE)
    if block is None:
        sys.exit("README.md shows no run of the program")
    output = "\n".join(line[4:] for line in block.group(2).rstrip("\n").split("\n")) + "\n"
    return block.group(1).split(), output


def main():
    program, project = sys.argv[1], Path(sys.argv[2])
    words, shown = shown_run((project / "README.md").read_text())
    date = re.search(r"as\s+of (\d{4}-\d\d-\d\d)", shown).group(1)
    got = subprocess.run([program, *words, "--as-of", date], cwd=project, stdout=subprocess.PIPE, text=True,
                         check=False).stdout
    difference = list(difflib.unified_diff(shown.splitlines(), got.splitlines(), "README.md", "the program", lineterm=""))
    print("\n".join(difference))
    sys.exit(1 if difference else 0)


main()
