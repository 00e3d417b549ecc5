"""Least squares of one explicit design with numpy: python3 lstsq.py FOLDER ROWS COLUMNS, run by lstsq.mjs.

FOLDER holds design.bin (row-major) and data.bin, doubles, little-endian. Prints the result as JSON.
"""

import json
import sys
from pathlib import Path

import numpy as np

folder = Path(sys.argv[1])
rows, columns = int(sys.argv[2]), int(sys.argv[3])
design = np.fromfile(folder / "design.bin", "<f8").reshape(rows, columns)
data = np.fromfile(folder / "data.bin", "<f8")

lengths = np.sqrt((design * design).sum(axis=0))
unit = design / lengths
first, _, rank, singular = np.linalg.lstsq(unit, data, rcond=None)
if rank != columns:
    raise SystemExit(f"expected rank {columns}, got {rank}")

# One step of refinement with residuals of extended precision: what is left is rounding of the last place.
long_unit = unit.astype(np.longdouble)
long_data = data.astype(np.longdouble)


def residual(solution):
    return long_data - long_unit @ solution


refined = first.astype(np.longdouble)
moved = []
for _ in range(2):
    step = np.linalg.lstsq(unit, residual(refined).astype(float), rcond=None)[0]
    refined = refined + step
    moved.append(float(np.abs(step).max() / np.abs(refined).max()))

left = residual(refined)
variance = float(left @ left) / (rows - columns)
upper = np.linalg.qr(unit, mode="r")
inverse = np.linalg.solve(upper, np.eye(columns))
covariance = variance * (inverse @ inverse.T) / np.outer(lengths, lengths)
other = variance * np.linalg.pinv(unit.T @ unit) / np.outer(lengths, lengths)
sigma = np.sqrt(np.diag(covariance))

print(
    json.dumps(
        {
            "numpy": np.__version__,
            "condition": float(singular[0] / singular[-1]),
            "moved": moved,
            "pinv": float((np.abs(covariance - other) / np.outer(sigma, sigma)).max()),
            "variance": variance,
            "coefficients": [float(value) for value in refined / lengths],
            "covariance": covariance.tolist(),
        }
    )
)
