# Makes second-opinion.json: decimals, cut (not rounded), of functions at 50, 1000 and 10,000 digits; of the long ones the last 100 digits.
#   /usr/bin/python3 test/lib/number/second-opinion.py > test/lib/number/second-opinion.json
import json
from mpmath import mp, mpf, mpc
import mpmath

REAL = {
    "pi": lambda: +mp.pi,
    "euler": lambda: +mp.euler,
    "ln2": lambda: mp.ln(2),
    "sqrt 2": lambda: mp.sqrt(2),
    "cbrt 5": lambda: mp.root(5, 3),
    "exp 1/3": lambda: mp.exp(mpf(1) / 3),
    "exp -29": lambda: mp.exp(-29),
    "ln 3": lambda: mp.ln(3),
    "ln 1000001/1000000": lambda: mp.ln(mpf(1000001) / 1000000),
    "sin 1": lambda: mp.sin(1),
    "cos 1": lambda: mp.cos(1),
    "sin 1000000": lambda: mp.sin(1000000),
    "tan 7/5": lambda: mp.tan(mpf(7) / 5),
    "atan 2/3": lambda: mp.atan(mpf(2) / 3),
    "asin 3/4": lambda: mp.asin(mpf(3) / 4),
    "acos 3/4": lambda: mp.acos(mpf(3) / 4),
    "sinh 1/7": lambda: mp.sinh(mpf(1) / 7),
    "agm 1 2": lambda: mp.agm(1, 2),
    "agm 1 1/1000000": lambda: mp.agm(1, mpf(1) / 1000000),
    "gamma 1/3": lambda: mp.gamma(mpf(1) / 3),
    "gamma -7/4": lambda: mp.gamma(-mpf(7) / 4),
    "gamma 100001/3": lambda: mp.gamma(mpf(100001) / 3),
    "gamma -3001/2": lambda: mp.gamma(-mpf(3001) / 2),
    "asinh 2/3": lambda: mp.asinh(mpf(2) / 3),
    "acosh 4/3": lambda: mp.acosh(mpf(4) / 3),
    "atanh 2/3": lambda: mp.atanh(mpf(2) / 3),
}
COMPLEX = {
    "exp 1/2+3i": lambda: mp.exp(mpc(mpf(1) / 2, 3)),
    "ln -2+i": lambda: mp.ln(mpc(-2, 1)),
    "sqrt -3+4/5i": lambda: mp.sqrt(mpc(-3, mpf(4) / 5)),
    "sin 1+2i": lambda: mp.sin(mpc(1, 2)),
    "atan 1+i": lambda: mp.atan(mpc(1, 1)),
    "agm 1 2i": lambda: mp.agm(1, mpc(0, 2)),
    "asinh 1+2i": lambda: mp.asinh(mpc(1, 2)),
    "acosh 1/2+i": lambda: mp.acosh(mpc(mpf(1) / 2, 1)),
    "atanh 2-i": lambda: mp.atanh(mpc(2, -1)),
    "fifth root of -3+i": lambda: mp.exp(mp.ln(mpc(-3, 1)) / 5),
    "mul": lambda: mpc(mpf(1) / 3, mpf(2) / 7) * mpc(mpf(5) / 11, mpf(-3) / 13),
}
# Beyond 1000 digits mpmath's own gamma at large arguments takes hours.
SHORT = ("gamma 100001/3", "gamma -3001/2")


def cut(x, digits):
    text = mpmath.nstr(x, digits + 20, strip_zeros=False, min_fixed=-mp.inf, max_fixed=mp.inf).lstrip("-")
    figures = text.replace(".", "").lstrip("0")
    return figures[:digits]


out = {
    "about": "decimals of real and complex functions, cut after the given number of significant digits (parts of complex values: each its own)",
    "source": f"mpmath {mpmath.__version__} with 40 more digits, by second-opinion.py beside this file; mpmath is under the BSD licence",
    "entries": [],
}
for digits in (50, 1000, 10000):
    mp.dps = digits + 40
    for name, f in REAL.items():
        if digits > 1000 and name in SHORT:
            continue
        figures = cut(f(), digits)
        out["entries"].append({"name": name, "digits": digits, "last": figures[-100:] if digits > 50 else figures})
    for name, f in COMPLEX.items():
        z = f()
        for part, x in (("re", z.real), ("im", z.imag)):
            figures = cut(x, digits)
            out["entries"].append({"name": name, "part": part, "digits": digits, "last": figures[-100:] if digits > 50 else figures})
print(json.dumps(out, indent=1))
