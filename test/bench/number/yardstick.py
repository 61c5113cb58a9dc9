# Times of mpmath (on gmpy2) for the inputs of number.mjs. Prints one line an operation: digits, name, ns a call.
import sys, time
from mpmath import mp, mpf, mpc, agm, pi
import mpmath
from mpmath.libmp import libelefun

OPERATIONS = {
    "mul": lambda x, y, z, w: x * y,
    "div": lambda x, y, z, w: x / y,
    "sqrt": lambda x, y, z, w: mp.sqrt(x),
    "complex mul": lambda x, y, z, w: z * w,
    "exp": lambda x, y, z, w: mp.exp(x),
    "complex exp": lambda x, y, z, w: mp.exp(z),
    "sin+cos": lambda x, y, z, w: mp.cos_sin(x),
    "ln": lambda x, y, z, w: mp.ln(x),
    "agm": lambda x, y, z, w: agm(x, y),
    "complex agm": lambda x, y, z, w: agm(z, w),
}


def measure(f, args, budget):
    f(*args)
    count, spent = 1, 0.0
    best = 1e99
    while spent < budget:
        start = time.process_time()
        for _ in range(count):
            f(*args)
        took = time.process_time() - start
        spent += took
        best = min(best, took / count)
        if took < budget / 20:
            count *= 2
    return best * 1e9


def pi_fresh():
    # The series itself, not the value that mpmath keeps.
    for cell in libelefun.pi_fixed.__closure__:
        if callable(cell.cell_contents):
            return cell.cell_contents(mp.prec)


budget = float(sys.argv[2]) if len(sys.argv) > 2 else 0.1
for digits in map(int, sys.argv[1].split(",")):
    mp.prec = int(digits * 3.3219280948873626) + 1
    x = mpf(22) / 27
    y = mpf(7) / 9
    args = (x, y, mpc(x, y), mpc(y, mpf(5) / 11))
    for name, f in OPERATIONS.items():
        print(f"{digits}\t{name}\t{measure(f, args, budget):.0f}", flush=True)
    print(f"{digits}\tpi\t{measure(lambda *_: pi_fresh(), args, budget):.0f}", flush=True)
