"""One factorisation and solve by SciPy's SuperLU: rows, columns and values as JSON on the standard input, the median of
some runs in milliseconds on the standard output."""

import json
import sys
import time

import numpy
import scipy.sparse
import scipy.sparse.linalg

given = json.load(sys.stdin)
shape = (given["n"], given["n"])
matrix = scipy.sparse.csc_matrix((given["value"], (given["row"], given["column"])), shape=shape)
rhs = numpy.array(given["rhs"])
taken = []
for _ in range(2 * given["times"]):
    start = time.perf_counter()
    scipy.sparse.linalg.splu(matrix).solve(rhs)
    taken.append(1000 * (time.perf_counter() - start))
print(sorted(taken[given["times"] :])[given["times"] // 2])
