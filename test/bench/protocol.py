"""The kernel beside Debian's Python kernel, in one run: checks of the protocol that both are given, and what they cost.

    python3 -W ignore test/bench/protocol.py [ROUNDS]     (npm run bench:protocol)

The checks are the same for both but for the language of the cells, each on a kernel of its own; most are rules of the
protocol, some are what it leaves open and users expect (text keeps its order, late text its cell). Rules that only newer
versions of the protocol have are left out, since the Python kernel of this Debian does not claim them. Times are medians of
rounds in turn; CPU is that of the kernel's processes together, which a busy machine does not change much.
"""
import os
import platform
import statistics
import subprocess
import sys
import tempfile
import time
from queue import Empty

import zmq

sys.path.insert(0, os.path.join(os.path.dirname(os.path.dirname(os.path.abspath(__file__))), "hosts", "protocol"))
from common import Exchange, ask, descendants, start  # noqa: E402
from protocol_checks import CHECKS, Kernel  # noqa: E402

ROOT = os.path.dirname(os.path.dirname(os.path.dirname(os.path.abspath(__file__))))
ROUNDS = int(sys.argv[1]) if len(sys.argv) > 1 else 5


def verdict(check, name):
    """Empty, or what went wrong."""
    kernel = Kernel(name)
    try:
        check(kernel)
        return ""
    except Empty:
        return "no answer"
    except (AssertionError, zmq.Again, subprocess.TimeoutExpired, IndexError, KeyError) as error:
        return f"{type(error).__name__}: {error}".split("\n")[0][:90]
    finally:
        kernel.close()


def ticks(pid):
    """CPU seconds of a process and all below it."""
    total = 0
    for each in [pid, *descendants(pid)]:
        try:
            with open(f"/proc/{each}/stat") as file:
                words = file.read().rsplit(")", 1)[1].split()
            total += int(words[11]) + int(words[12]) + int(words[13]) + int(words[14])
        except FileNotFoundError:
            pass
    return total / os.sysconf("SC_CLK_TCK")


def memory(pid):
    total = 0
    for each in [pid, *descendants(pid)]:
        with open(f"/proc/{each}/smaps_rollup") as file:
            total += next(int(line.split()[1]) for line in file if line.startswith("Pss:"))
    return total / 1024


def cost(name):
    """(wall ms, CPU ms) of start, round trip, completion; MB of memory."""
    began = time.monotonic()
    manager, client = start(name)
    pid = manager.provisioner.pid
    started = (1000 * (time.monotonic() - began), 1000 * ticks(pid))
    run = lambda code: Exchange(client, client.execute(code))
    run("1 + 1")
    costs = [started, per_call(pid, 100, lambda n: run(f"{n} + 1"))]
    code = "Math." if name == "halfperiod" else "import math; math."

    def complete(_):
        ask(client, "complete_request", {"code": code, "cursor_pos": len(code)})

    complete(0)
    costs.append(per_call(pid, 40, complete))
    costs.append((memory(pid),))
    client.stop_channels()
    manager.shutdown_kernel()
    return costs


def per_call(pid, count, call):
    before, times = ticks(pid), []
    for n in range(count):
        began = time.monotonic()
        call(n)
        times.append(1000 * (time.monotonic() - began))
    return (statistics.median(times), 1000 * (ticks(pid) - before) / count)


def main():
    with tempfile.TemporaryDirectory() as place:
        install = ["node", os.path.join(ROOT, "kernel/bin/halfperiod.mjs"), "install", "--at", place]
        subprocess.run(install, check=True, stdout=subprocess.DEVNULL)
        os.environ.update(JUPYTER_PATH=place, JUPYTER_RUNTIME_DIR=os.path.join(place, "runtime"), JUPYTER_NO_CONFIG="1")
        os.environ.update(HALFPERIOD_HISTORY="off", PYDEVD_DISABLE_FILE_VALIDATION="1", IPYTHONDIR=os.path.join(place, "ipython"))
        names = ["python3", "halfperiod"]
        verdicts = {name: {check.__name__: verdict(check, name) for check in CHECKS} for name in names}
        for name in names:
            cost(name)  # files into the cache
        rounds = [[cost(name) for name in names] for _ in range(ROUNDS)]
    with open("/proc/cpuinfo") as file:
        model = next(line.split(":")[1].strip() for line in file if line.startswith("model name"))
    print(f"{model}, {os.cpu_count()} cores, load {os.getloadavg()[0]:.0f}, Python {platform.python_version()}; medians of {ROUNDS} rounds in turn\n")
    print("| | Python kernel | halfperiod | ratio |\n|---|---:|---:|---:|")
    passed = [sum(not words for words in verdicts[name].values()) for name in names]
    print(f"| checks passed, of {len(CHECKS)} | {passed[0]} | {passed[1]} | |")
    rows = [("start to ready", 0), ("a cell there and back", 1), ("completion", 2), ("memory, MB", 3)]
    for title, index in rows:
        for part, unit in enumerate((", ms", ", ms of CPU") if index < 3 else ("",)):
            theirs, ours = (statistics.median(r[side][index][part] for r in rounds) for side in (0, 1))
            print(f"| {title}{unit} | {theirs:.1f} | {ours:.1f} | {ours / theirs:.2f} |")
    for name in names:
        failed = {check: words for check, words in verdicts[name].items() if words}
        print(f"\n{name}: " + ("all checks passed" if not failed else "not passed"))
        for check, words in failed.items():
            print(f"- {check.replace('_', ' ')}: {words}")


main()
