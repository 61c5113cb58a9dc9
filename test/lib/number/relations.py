# Makes the tables of lib/number/fixed/relations.ts: for each level short integer relations among 13 logarithms (or angles) whose values are about
# 2^-level, by lattice reduction of the rows (weights·unit vector, 2^level·value). The prime 2 and the quarter turn cost nothing, hence their small weight.
#   python3 relations.py > relations.json   (needs mpmath; about half a minute)
import json
from mpmath import mp

mp.prec = 600
LEVELS = [20, 40, 60, 80, 100]
PRIMES = [2, 3, 5, 7, 11, 13, 17, 19, 23, 29, 31, 37, 41]
GAUSSIAN = [(1, 1), (2, 1), (3, 2), (4, 1), (5, 2), (6, 1), (5, 4), (7, 2), (6, 5), (8, 3), (8, 5), (9, 4), (10, 1)]
SCALE = 64


def reduce(rows):
    """Lenstra, Lenstra, Lovász with orthogonalisation in 600 bits."""
    n = len(rows)
    mu = [[mp.mpf(0)] * n for _ in rows]
    star, norm = [None] * n, [mp.mpf(0)] * n

    def orthogonal(i):
        v = [mp.mpf(x) for x in rows[i]]
        for j in range(i):
            mu[i][j] = sum(x * y for x, y in zip(rows[i], star[j])) / norm[j]
            v = [a - mu[i][j] * b for a, b in zip(v, star[j])]
        star[i], norm[i] = v, sum(a * a for a in v)

    orthogonal(0)
    k = 1
    while k < n:
        orthogonal(k)
        for j in range(k - 1, -1, -1):
            q = int(mp.nint(mu[k][j]))
            if q:
                rows[k] = [a - q * b for a, b in zip(rows[k], rows[j])]
                for l in range(j):
                    mu[k][l] -= q * mu[j][l]
                mu[k][j] -= q
        if norm[k] >= (mp.mpf("0.999") - mu[k][k - 1] ** 2) * norm[k - 1]:
            k += 1
        else:
            rows[k], rows[k - 1] = rows[k - 1], rows[k]
            orthogonal(k - 1)
            k = max(k - 1, 1)
    return rows


def levels(values, weights):
    n = len(values)
    basis = [[int(i == j) for j in range(n)] for i in range(n)]
    whole = [int(mp.nint(w * SCALE)) for w in weights]
    # The least vector of value 1 in the weighted norm, whose coordinates in a basis are the pull.
    least = [v / w**2 for v, w in zip(values, weights)]
    size = sum(a * v for a, v in zip(least, values))
    result = []
    for level in range(2, max(LEVELS) + 1, 2):
        last = [int(mp.nint(sum(u * v for u, v in zip(row, values)) * mp.mpf(2) ** level * SCALE)) for row in basis]
        reduced = reduce([[u * w for u, w in zip(row, whole)] + [x] for row, x in zip(basis, last)])
        basis = [[x // w for x, w in zip(row[:n], whole)] for row in reduced]
        if level in LEVELS:
            pull = mp.lu_solve(mp.matrix(basis).T, mp.matrix([a / size for a in least]))
            result.append({"pull": [float(x) for x in pull], "rows": sum(basis, [])})
    return result


logs = [mp.log(p) for p in PRIMES]
angles = [2 * mp.atan(mp.mpf(b) / a) for a, b in GAUSSIAN]
tenth = mp.mpf(0.1)
print(
    json.dumps(
        {
            "logs": levels(logs, [tenth] + [mp.log(p, 2) for p in PRIMES[1:]]),
            "angles": levels(angles, [tenth] + [mp.log(a * a + b * b, 2) for a, b in GAUSSIAN[1:]]),
        }
    )
)
