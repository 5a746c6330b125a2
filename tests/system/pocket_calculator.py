"""Checks a page of `slipledger explain --json` the way a reader with a pocket calculator would: puts the printed numbers
into the printed formula and holds the result against the printed one, no closer than the printed digits allow."""
import math
import re

from proving_ground import want

FUNCTIONS = {"exp": math.exp, "ln": math.log, "log10": math.log10, "sqrt": math.sqrt, "abs": abs}
NAME = re.compile(r"[A-Za-z_][A-Za-z0-9_]*")
DIGITS = {"A": 9, "B": 9}  # of the oil's line; all others carry six
USUAL_DIGITS = 6


def half_of_last_digit(value, digits=USUAL_DIGITS):
    """How far a number may be from the one it was rounded from."""
    return 0.0 if value == 0 else 0.5 * 10.0 ** (math.floor(math.log10(abs(value))) - digits + 1)


def evaluated(formula, values):
    python = formula.replace("^", "**")
    want(set(python) <= set("0123456789abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ_.+-*/() "),
         f"a formula holds signs no calculator has: {formula}")
    return eval(python, {"__builtins__": {}}, {**FUNCTIONS, **values})  # its signs were looked at above


def check_step(step, known):
    """`known`: symbol -> (value, how far it may be off). Only what stands on the page before may be used."""
    formula, value = step["formula"], step["value"]
    used = [name for name in dict.fromkeys(NAME.findall(formula)) if name not in FUNCTIONS]
    strange = [name for name in used if name not in known]
    want(not strange, f"{step['symbol']} = {formula} uses {strange}, which stand nowhere before it")
    values = {name: known[name][0] for name in used}
    got = evaluated(formula, values)
    off = half_of_last_digit(value, DIGITS.get(step["symbol"], USUAL_DIGITS))
    for name in used:
        nudged = evaluated(formula, {**values, name: values[name] + known[name][1]})
        off += abs(nudged - got)
    want(abs(got - value) <= 1.01 * off,
         f"{step['symbol']} = {formula} is printed as {value}; with the printed numbers it is {got} (+-{off:.2g})")
    in_words = NAME.sub(lambda m: m[0] if m[0] in FUNCTIONS else "#", formula)
    shown = [name for name in NAME.findall(step["numbers"]) if name not in FUNCTIONS and not re.fullmatch(r"e", name)]
    want(not shown, f"the numbers of {step['symbol']} = {step['numbers']} still hold the symbols {shown}")
    want(in_words.count("#") == 0 or step["numbers"] != formula, f"{formula} was given no numbers")
    by_numbers = evaluated(step["numbers"], {})
    want(abs(by_numbers - got) <= 1e-9 * max(1.0, abs(got)), f"{step['numbers']} is not {formula} with its numbers")


def check_page(page):
    """Every number of the page. Returns how many were worked out and how many were given."""
    known, worked = {}, 0
    for step in page["steps"]:
        symbol, value = step["symbol"], step["value"]
        want(symbol not in known, f"{symbol} stands twice on the page")
        want(value is not None, f"{symbol} ({step['name']}) has no value")
        want(step["source"], f"{symbol} has no source")
        if step["formula"]:
            check_step(step, known)
            worked += 1
        known[symbol] = (value, half_of_last_digit(value, DIGITS.get(symbol, USUAL_DIGITS)))
        if step["sd"] is not None:
            known["sd_" + symbol] = (step["sd"], half_of_last_digit(step["sd"]))
    return worked, len(page["steps"]) - worked
