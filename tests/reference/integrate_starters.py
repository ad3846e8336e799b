"""Integrates documents of the workbench with SciPy, from their processes as they are written.

Reads a JSON list on standard input, one entry a document:
{ "states": [...], "values": {...}, "totals": {symbol: [state, ...]}, "intermediates": [[symbol, formula], ...],
  "processes": [[rate, [[state, amount], ...]], ...], "starts": [...], "times": [...] }
and prints for each the states at the times (list of lists). Formulas are turned into Python by text alone, so
that nothing here is shared with the engine.
"""
import json
import math
import re
import sys

import numpy
from scipy.integrate import solve_ivp

FUNCTIONS = {
    "exp": math.exp, "log": math.log, "sqrt": math.sqrt, "abs": abs, "min": min, "max": max,
    "sin": math.sin, "cos": math.cos, "tanh": math.tanh,
}


def to_python(formula):
    """The operators that Python writes differently; `cond ? a : b` is refused, no starter needs it."""
    if "?" in formula:
        raise ValueError("conditionals are not translated: " + formula)
    return re.sub(r"\^", "**", formula)


def compiled(formula):
    return compile(to_python(formula), "<formula>", "eval")


def right_hand_side(document):
    states = document["states"]
    intermediates = [(symbol, compiled(formula)) for symbol, formula in document["intermediates"]]
    processes = [
        (compiled(rate), [(states.index(of), compiled(amount)) for of, amount in effects])
        for rate, effects in document["processes"]
    ]

    def f(t, u):
        scope = dict(FUNCTIONS, t=t, **document["values"], **dict(zip(states, map(float, u))))
        for symbol, members in document["totals"].items():
            scope[symbol] = sum(scope[one] for one in members)
        for symbol, code in intermediates:
            scope[symbol] = eval(code, {"__builtins__": {}}, scope)
        out = [0.0] * len(states)
        for rate, effects in processes:
            value = eval(rate, {"__builtins__": {}}, scope)
            for at, amount in effects:
                out[at] += value * eval(amount, {"__builtins__": {}}, scope)
        return out

    return f


def main():
    answers = []
    for document in json.load(sys.stdin):
        times = numpy.array(document["times"])
        found = solve_ivp(
            right_hand_side(document), (times[0], times[-1]), document["starts"],
            method="DOP853", t_eval=times, rtol=1e-11, atol=1e-14,
        )
        answers.append(found.y.T.tolist() if found.success else None)
    json.dump(answers, sys.stdout)


main()
