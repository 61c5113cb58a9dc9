# The jobs of functions.mjs in mpmath: processor time in microseconds a call, one line a job. Arguments: digits, seconds for each job.
import sys, time
from mpmath import mp, mpf, mpc, elliprf, elliprj, elliprd, elliprg, ellipk, ellipe, ellipf, ellippi, ellipfun, jtheta, kleinj, exp, pi

digits, budget = int(sys.argv[1]), float(sys.argv[2])
mp.dps = digits
a, b, c, d = mpf(11) / 10, mpf(23) / 10, mpf(37) / 10, mpf(5)
z = [mpc(a, c), mpc(b, -a), mpc(c, b)]
m, phi, u = mpf(3) / 10, mpf(7) / 10, mpf(7) / 10
w, tau = mpc(mpf(41) / 100, mpf(27) / 100), mpc(mpf(1) / 7, mpf(9) / 10)
q = exp(1j * pi * tau)
jobs = {
    "RF real": lambda: elliprf(a, b, c),
    "RF complex": lambda: elliprf(*z),
    "RD real": lambda: elliprd(a, b, c),
    "RG real": lambda: elliprg(a, b, c),
    "RJ real": lambda: elliprj(a, b, c, d),
    "RJ complex": lambda: elliprj(*z, d),
    "K(m)": lambda: ellipk(m),
    "E(m)": lambda: ellipe(m),
    "F(phi|m)": lambda: ellipf(phi, m),
    "E(phi|m)": lambda: ellipe(phi, m),
    "Pi(n; phi|m)": lambda: ellippi(m / 3, phi, m),
    "sn, cn, dn real u": lambda: [ellipfun(f, u, m=m) for f in ("sn", "cn", "dn")],
    "sn, cn, dn complex u": lambda: [ellipfun(f, w, m=m) for f in ("sn", "cn", "dn")],
    "theta3 complex v": lambda: jtheta(3, pi * w, q),
    "j(tau)": lambda: kleinj(tau=tau),
}
for name, f in jobs.items():
    f()
    runs, start = 0, time.process_time()
    while runs < 2 or time.process_time() - start < budget:
        f()
        runs += 1
    total = time.process_time() - start
    print(f"{name}\t{total / runs * 1e6}")
