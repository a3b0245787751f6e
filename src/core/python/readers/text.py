import gzip
import re
import numpy as np


def read_text(path, facts):
    """One column of a text file, plain or gzipped. Blank lines and comments (#, %) are passed over; an empty or "missing" cell is NaN."""
    with (gzip.open if facts["gzip"] else open)(path, "rb") as file:
        lines = file.read().decode("latin-1").split(facts["newline"])[facts["first_line"] - 1 :]
    missing = re.compile(r"[-+]?(nan|na|n/a|null|none|missing|-|nan\(ind\)|1\.#(ind|qnan)\d*)?", re.IGNORECASE)
    out = []
    for line in lines:
        if line.strip(" \t\r") == "" or line.lstrip(" \t\r")[0] in "#%":
            continue
        cells = line.split() if facts["delimiter"] == " " else line.split(facts["delimiter"])
        cell = cells[facts["column"]].strip(" \t\r").strip('"')
        if facts["decimal_comma"]:
            cell = cell.replace(",", ".")
        cell = re.sub(r"(?i)1\.#inf\d*", "inf", cell)
        out.append(np.nan if missing.fullmatch(cell) else float(re.sub("[dD](?=[-+0-9])", "e", cell)))
    return np.array(out, dtype=np.float64)
