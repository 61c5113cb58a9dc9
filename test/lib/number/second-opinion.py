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
}
COMPLEX = {
    "exp 1/2+3i": lambda: mp.exp(mpc(mpf(1) / 2, 3)),
    "ln -2+i": lambda: mp.ln(mpc(-2, 1)),
    "sqrt -3+4/5i": lambda: mp.sqrt(mpc(-3, mpf(4) / 5)),
    "sin 1+2i": lambda: mp.sin(mpc(1, 2)),
    "atan 1+i": lambda: mp.atan(mpc(1, 1)),
    "agm 1 2i": lambda: mp.agm(1, mpc(0, 2)),
}
# Beyond 1000 digits mpmath's own gamma and Euler's constant take minutes.
LONG = [name for name in REAL if not name.startswith(("gamma", "euler"))]


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
        if digits > 1000 and name not in LONG:
            continue
        figures = cut(f(), digits)
        out["entries"].append({"name": name, "digits": digits, "last": figures[-100:] if digits > 50 else figures})
    if digits > 1000:
        continue
    for name, f in COMPLEX.items():
        z = f()
        for part, x in (("re", z.real), ("im", z.imag)):
            figures = cut(x, digits)
            out["entries"].append({"name": name, "part": part, "digits": digits, "last": figures[-100:] if digits > 50 else figures})
print(json.dumps(out, indent=1))
