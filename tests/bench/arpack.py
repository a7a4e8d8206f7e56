"""SciPy's ARPACK on the same matrix: the largest pairs of D^-1/2 W D^-1/2 with the known vector deflated.

Reads `<folder>/{offsets,targets,weights}.bin`; prints one JSON line: seconds (median) and values.
"""
import json
import sys
import time

import numpy as np
import scipy
from scipy.sparse import csr_matrix
from scipy.sparse.linalg import LinearOperator, eigsh

folder, k, tolerance, runs = sys.argv[1], int(sys.argv[2]), float(sys.argv[3]), int(sys.argv[4])
offsets = np.fromfile(f"{folder}/offsets.bin", dtype=np.int32)
targets = np.fromfile(f"{folder}/targets.bin", dtype=np.int32)
weights = np.fromfile(f"{folder}/weights.bin", dtype=np.float64)
n = len(offsets) - 1
w = csr_matrix((weights, targets, offsets), shape=(n, n))
d = np.asarray(w.sum(axis=1)).ravel()
s = 1 / np.sqrt(d)
a = csr_matrix((weights * np.repeat(s, np.diff(offsets)) * s[targets], targets, offsets), shape=(n, n))
null = np.sqrt(d)
null /= np.linalg.norm(null)
# The null vector has the value 1; taking 3 off moves it below all others, which lie in [-1, 1].
operator = LinearOperator((n, n), matvec=lambda x: a @ x - 3 * null * (null @ x), dtype=np.float64)
seconds = []
for run in range(runs):
    begin = time.perf_counter()
    values, vectors = eigsh(operator, k=k, which="LA", tol=tolerance, v0=np.random.default_rng(run).standard_normal(n))
    seconds.append(time.perf_counter() - begin)
residuals = [float(np.linalg.norm(a @ v - x * v)) for x, v in zip(values, vectors.T)]
print(json.dumps({
    "scipy": scipy.__version__,
    "seconds": float(np.median(seconds)),
    "values": sorted(float(1 - x) for x in values),
    "residual": max(residuals),
}))
