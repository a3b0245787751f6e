import json
import math
import sys


def agreement(results, expected):
    """Compares every number with Fringeside's: it agrees within the larger of rel * |expected| and abs, in its own unit."""
    rows = []
    for step, quantities in expected.items():
        numbers = results[step]["numbers"]
        for quantity, (value, unit, rel, abs_) in quantities.items():
            found = float(numbers[quantity]) if quantity in numbers else math.nan
            tolerance = max(rel * abs(value), abs_)
            both_nan = math.isnan(found) and math.isnan(value) and quantity in numbers
            agrees = both_nan or found == value or abs(found - value) <= tolerance
            rows.append(
                {
                    "step": step,
                    "quantity": quantity,
                    "found": found if math.isfinite(found) else str(found),
                    "expected": value if math.isfinite(value) else str(value),
                    "unit": unit,
                    "tolerance": tolerance if math.isfinite(tolerance) else str(tolerance),
                    "agrees": agrees,
                }
            )
    return rows


def report(results, expected, not_compared):
    """Prints the outcome as JSON; returns the exit code: 0 when every number agrees, 1 otherwise."""
    rows = agreement(results, expected)
    agrees = len(rows) > 0 and all(row["agrees"] for row in rows)
    outcome = {"agrees": agrees, "numbers": rows, "not_compared": not_compared}
    print(json.dumps(outcome, indent=1, allow_nan=False))
    for row in rows:
        if not row["agrees"]:
            print(f"DIFFERS {row['step']}.{row['quantity']}: {row['found']}, expected {row['expected']}", file=sys.stderr)
    return 0 if agrees else 1
