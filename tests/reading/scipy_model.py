"""For tests only: a Model as arrays for HiGHS, written from the constraint's definition and not from the readers."""

import numpy as np
from scipy.optimize import linprog


def solve(model):
    """(status, optimum in the model's own goal) by HiGHS; every bound is passed as an ordinary row."""
    sign = -1 if model.objective.goal == "max" else 1
    upper, upper_side, equal, equal_side = [], [], [], []
    for row in model.constraints:
        line, side = [float(value) for value in row.coefficients], float(row.rhs)
        if row.sense == "==":
            equal.append(line)
            equal_side.append(side)
        else:
            flip = -1 if row.sense == ">=" else 1
            upper.append([flip * value for value in line])
            upper_side.append(flip * side)
    n = model.n
    answer = linprog(
        [sign * float(value) for value in model.objective.coefficients],
        np.array(upper).reshape(-1, n),
        upper_side,
        np.array(equal).reshape(-1, n),
        equal_side,
        bounds=(None, None),
    )
    return answer.status, None if answer.fun is None else sign * answer.fun + float(model.objective.constant)
