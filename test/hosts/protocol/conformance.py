"""What the protocol says a client sees of a kernel, asked through Python's jupyter_client. Run by the test beside it.

Each test stands for one rule of the messaging protocol; the text of the rule is its docstring.
"""
import os
import signal
import subprocess
import sys
import tempfile
import time
import unittest
from queue import Empty

import zmq
from jupyter_client import BlockingKernelClient
from jupyter_client.manager import KernelManager

SLOW = float(os.environ.get("HALFPERIOD_TEST_WAIT", "60"))


def alive(pid):
    try:
        with open(f"/proc/{pid}/stat") as file:
            return file.read().rsplit(")", 1)[1].split()[0] != "Z"
    except FileNotFoundError:
        return False


def descendants(pid):
    try:
        with open(f"/proc/{pid}/task/{pid}/children") as file:
            children = [int(word) for word in file.read().split()]
    except FileNotFoundError:
        return []
    return children + [below for child in children for below in descendants(child)]


def gone(pids, seconds):
    end = time.time() + seconds
    while time.time() < end:
        if not any(alive(pid) for pid in pids):
            return True
        time.sleep(0.02)
    return not any(alive(pid) for pid in pids)


def start(**options):
    manager = KernelManager(kernel_name="halfperiod")
    manager.start_kernel(**options)
    client = manager.client()
    client.start_channels()
    client.wait_for_ready(timeout=SLOW)
    return manager, client


class Exchange:
    """A request with its reply and what was published for it, up to idle."""

    def __init__(self, client, msg_id, channel="shell", timeout=SLOW):
        self.id = msg_id
        self.reply = None
        self.published = []
        get = client.get_control_msg if channel == "control" else client.get_shell_msg
        end = time.time() + timeout
        while True:
            message = client.get_iopub_msg(timeout=max(0.1, end - time.time()))
            if message["parent_header"].get("msg_id") != msg_id:
                continue
            self.published.append(message)
            if message["content"].get("execution_state") == "idle":
                break
        while self.reply is None:
            message = get(timeout=max(0.1, end - time.time()))
            if message["parent_header"].get("msg_id") == msg_id:
                self.reply = message

    @property
    def content(self):
        return self.reply["content"]

    @property
    def order(self):
        return [m["content"].get("execution_state") or m["msg_type"] for m in self.published]

    def of(self, kind):
        return [m["content"] for m in self.published if m["msg_type"] == kind]

    def text(self, name="stdout"):
        return "".join(c["text"] for c in self.of("stream") if c["name"] == name)


class Shared(unittest.TestCase):
    """One kernel for all tests of the class."""

    @classmethod
    def setUpClass(cls):
        cls.manager, cls.client = start()
        cls.run_cell(cls, "1")

    @classmethod
    def tearDownClass(cls):
        cls.client.stop_channels()
        cls.manager.shutdown_kernel(now=True)

    def run_cell(self, code, timeout=SLOW, **options):
        return Exchange(self.client, self.client.execute(code, **options), timeout=timeout)

    def ask(self, kind, content, channel="shell"):
        message = self.client.session.msg(kind, content)
        (self.client.control_channel if channel == "control" else self.client.shell_channel).send(message)
        return Exchange(self.client, message["header"]["msg_id"], channel)


class Execute(Shared):
    def test_order(self):
        """busy, execute_input, outputs, idle; the reply carries the count of execute_input and of the result"""
        done = self.run_cell('console.log("a"); 6 * 7')
        self.assertEqual(done.order, ["busy", "execute_input", "stream", "execute_result", "idle"])
        counts = {done.content["execution_count"]} | {
            c["execution_count"] for kind in ("execute_input", "execute_result") for c in done.of(kind)
        }
        self.assertEqual(len(counts), 1)
        self.assertEqual(done.content["user_expressions"], {})
        self.assertEqual(done.content["payload"], [])

    def test_streams_in_order(self):
        """the order between stdout and stderr is kept"""
        done = self.run_cell('for (let i = 0; i < 50; i++) { console.log("o" + i); console.error("e" + i) }')
        texts = [(c["name"], c["text"]) for c in done.of("stream")]
        self.assertEqual("".join(t for _, t in texts), "".join(f"o{i}\ne{i}\n" for i in range(50)))
        self.assertEqual({n for n, t in texts if "o" in t}, {"stdout"})

    def test_stdout_passes_untouched(self):
        """carriage return, backspace, ANSI, NUL, lone surrogates and astral letters pass"""
        done = self.run_cell(r'process.stdout.write("a\rb\bc\x1b[31md\x1b[0m\0😀\u2028"); process.stdout.write("\ud83d"); process.stdout.write("\ude00")')
        self.assertEqual(done.text(), "a\rb\bc\x1b[31md\x1b[0m\0😀\u2028😀")

    def test_live_output(self):
        """text goes out while the cell computes without yielding"""
        msg_id = self.client.execute('console.log("early"); const until = Date.now() + 1500; while (Date.now() < until); "done"')
        sent = time.time()
        while True:
            message = self.client.get_iopub_msg(timeout=SLOW)
            if message["parent_header"].get("msg_id") == msg_id and message["msg_type"] == "stream":
                break
        early = time.time()
        rest = Exchange(self.client, msg_id)
        self.assertGreater(time.time() - early, 0.8, f"came {early - sent} s after sending")
        self.assertEqual(rest.content["status"], "ok")

    def test_silent(self):
        """silent: nothing but busy and idle, no count, no history"""
        before = self.run_cell("0").content["execution_count"]
        done = self.run_cell('console.log("x"); 5', silent=True)
        self.assertEqual(done.order, ["busy", "idle"])
        self.assertEqual(done.content["execution_count"], before)

    def test_store_history_false(self):
        """store_history false: published as usual, no count"""
        before = self.run_cell("0").content["execution_count"]
        done = self.run_cell("5", store_history=False)
        self.assertEqual(done.order, ["busy", "execute_input", "execute_result", "idle"])
        self.assertEqual(done.content["execution_count"], before)
        self.assertEqual(self.run_cell("0").content["execution_count"], before + 1)

    def test_user_expressions(self):
        """each user expression has its own outcome"""
        done = self.run_cell("const ue = 20", user_expressions={"good": "ue + 1", "bad": "no_such_name", "worse": ")("})
        expressions = done.content["user_expressions"]
        self.assertEqual(expressions["good"]["data"]["text/plain"], "21")
        for name in ("bad", "worse"):
            self.assertEqual(expressions[name]["status"], "error")
            self.assertTrue({"ename", "evalue", "traceback"} <= set(expressions[name]))
        self.assertEqual(done.order, ["busy", "execute_input", "idle"])

    def test_error_fields(self):
        """one error message with exactly the reply's fields, all strings, also for odd things that are thrown"""
        for thrown in ("new RangeError('r')", "42", "null", "undefined", '"\\ud800"', "{ toString() { throw 1 } }", "Symbol('s')"):
            with self.subTest(thrown=thrown):
                done = self.run_cell(f"throw {thrown}")
                self.assertEqual(done.order, ["busy", "execute_input", "error", "idle"])
                error = done.of("error")[0]
                self.assertEqual(set(error), {"ename", "evalue", "traceback"})
                for name in ("ename", "evalue", "traceback"):
                    self.assertEqual(done.content[name], error[name])
                self.assertTrue(all(isinstance(x, str) for x in [error["ename"], error["evalue"], *error["traceback"]]))

    def test_type_error_runs_nothing(self):
        """a compile error is a failed cell of which nothing runs"""
        done = self.run_cell('console.log("ran"); const n: number = "text"')
        self.assertEqual(done.order, ["busy", "execute_input", "error", "idle"])
        self.assertEqual(done.content["ename"], "TypeScriptError")
        self.assertRegex(done.content["evalue"], r"^TS\d+: ")

    def test_empty(self):
        """empty, blank and comment-only code is ok and has no result"""
        for code in ("", "  \n\t", "// remark", "/* remark */", "\ufeff", ";"):
            with self.subTest(code=code):
                done = self.run_cell(code)
                self.assertEqual(done.content["status"], "ok")
                self.assertEqual(done.of("execute_result"), [])

    def test_abort(self):
        """what has arrived when a cell fails is answered unrun; other requests are served; later cells run"""
        ids = [self.client.execute('await new Promise((r) => setTimeout(r, 50)); throw new Error("first")')]
        ids += [self.client.execute(f'console.log("never {i}")') for i in range(20)]
        info = self.client.kernel_info()
        replies = {}
        while len(replies) < len(ids) + 1:
            message = self.client.get_shell_msg(timeout=SLOW)
            replies[message["parent_header"]["msg_id"]] = message
        self.assertEqual(replies[info]["msg_type"], "kernel_info_reply")
        for msg_id in ids:
            self.assertEqual(replies[msg_id]["content"]["status"], "error")
            self.assertIn("execution_count", replies[msg_id]["content"])
        states = {msg_id: [] for msg_id in ids}
        while states[ids[-1]] != ["busy", "idle"]:
            message = self.client.get_iopub_msg(timeout=SLOW)
            if message["parent_header"]["msg_id"] in states:
                content = message["content"]
                states[message["parent_header"]["msg_id"]].append(content.get("execution_state") or message["msg_type"])
        self.assertTrue(all(states[msg_id] == ["busy", "idle"] for msg_id in ids[1:]), states)
        self.assertEqual(self.run_cell("7").content["status"], "ok")

    def test_no_window(self):
        """a cell sent after the failure's idle always runs"""
        for _ in range(40):
            self.run_cell('throw new Error("x")')
            self.assertEqual(self.run_cell("1").content["status"], "ok")

    def test_stop_on_error_false(self):
        """stop_on_error false: the queue goes on"""
        first = self.client.execute('throw new Error("x")', stop_on_error=False)
        second = self.client.execute("8")
        Exchange(self.client, first)
        self.assertEqual(Exchange(self.client, second).content["status"], "ok")

    def test_exit_is_said(self):
        """process.exit in a cell is an error of the cell, and the session goes on"""
        done = self.run_cell("process.exit(3)")
        self.assertEqual(done.content["status"], "error")
        self.assertEqual(self.run_cell("1 + 1").of("execute_result")[0]["data"]["text/plain"], "2")

    def test_late_output(self):
        """late text goes to the cell that started it, with no new busy; a throw in a timer ends nothing"""
        starter = self.run_cell('setTimeout(() => console.log("late"), 300); setTimeout(() => { throw new Error("in timer") }, 310); 0')
        other = self.run_cell('await new Promise((r) => setTimeout(r, 800)); console.log("own")')
        self.assertEqual(other.text(), "own\n")
        self.assertEqual([m["content"].get("text") for m in other.published if m["msg_type"] == "stream"], ["own\n"])
        self.assertNotIn("late", starter.text())
        self.assertEqual(self.run_cell("1").content["status"], "ok")

    def test_thousand_cells(self):
        """a thousand quick cells, in order"""
        ids = [self.client.execute(f"{i}", store_history=False) for i in range(1000)]
        answered = []
        while len(answered) < len(ids):
            answered.append(self.client.get_shell_msg(timeout=SLOW)["parent_header"]["msg_id"])
        self.assertEqual(answered, ids)
        Exchange(self.client, self.client.execute(""))


class Output(Shared):
    def test_ten_megabytes(self):
        """10 MB in one cell: whole, in tens of messages, within the limits of the notebook server"""
        done = self.run_cell('for (let i = 0; i < 100_000; i++) console.log(String(i).padStart(99, "."))')
        self.assertEqual(done.text(), "".join(str(i).rjust(99, ".") + "\n" for i in range(100_000)))
        self.assertLess(len(done.of("stream")), 1000)

    def test_hundred_megabytes(self):
        """100 MB in one cell: whole"""
        done = self.run_cell('const block = "0123456789abcdef".repeat(65536); for (let i = 0; i < 100; i++) process.stdout.write(block)', timeout=120)
        self.assertEqual(len(done.text()), 100 * 2**20)

    def test_endless_print_is_bounded(self):
        """a cell that prints for ever does not grow the kernel, and can be interrupted"""
        pid = self.manager.provisioner.pid
        msg_id = self.client.execute('for (;;) console.log("x".repeat(1000))')
        end, peak = time.time() + 4, 0
        while time.time() < end:
            try:
                self.client.get_iopub_msg(timeout=0.2)
            except Empty:
                pass
            with open(f"/proc/{pid}/statm") as file:
                peak = max(peak, int(file.read().split()[1]) * 4096)
        self.manager.interrupt_kernel()
        self.assertEqual(Exchange(self.client, msg_id, timeout=120).content["status"], "error")
        self.assertLess(peak, 1_500_000_000)
        self.assertEqual(self.run_cell("1").content["status"], "ok")

    def test_display_ids(self):
        """a named display is shown once and then updated under its id; a thousand updates are few messages"""
        done = self.run_cell("for (const n of progress(Array.from({ length: 1000 }, (_, k) => k))) await null")
        shown, updates = done.of("display_data"), done.of("update_display_data")
        self.assertEqual(len(shown), 1)
        self.assertLess(len(updates), 200)
        ids = {content["transient"]["display_id"] for content in shown + updates}
        self.assertEqual(len(ids), 1)
        self.assertIn("1000 of 1000", updates[-1]["data"]["text/plain"])

    def test_result_of_odd_values(self):
        """a value whose printing throws or that is huge does not break the reply"""
        for code in (
            "({ get x() { throw 1 } })",
            "new Proxy({}, { get() { throw 1 }, ownKeys() { throw 2 } })",
            "(() => { const a: any = {}; a.a = a; return a })()",
            '"x".repeat(2_000_000)',
            "Array.from({ length: 300_000 }, (_, i) => i)",
            "Symbol('s')",
            "new Map([[{}, new Set([1n])]])",
        ):
            with self.subTest(code=code):
                done = self.run_cell(code)
                self.assertEqual(done.content["status"], "ok", done.content)
                self.assertIn("text/plain", done.of("execute_result")[0]["data"])


class Requests(Shared):
    def test_kernel_info_on_both(self):
        """kernel_info has the same content on shell and control"""
        shell, control = self.ask("kernel_info_request", {}), self.ask("kernel_info_request", {}, "control")
        self.assertEqual(shell.content, control.content)
        self.assertEqual(shell.content["protocol_version"], shell.reply["header"]["version"])
        for done in (shell, control):
            self.assertEqual(done.order, ["busy", "idle"])

    def test_control_while_busy(self):
        """control answers at once while a cell computes without yielding"""
        msg_id = self.client.execute("const end = Date.now() + 1500; while (Date.now() < end);")
        time.sleep(0.5)
        started = time.time()
        self.ask("kernel_info_request", {}, "control")
        self.assertLess(time.time() - started, 0.7)
        Exchange(self.client, msg_id)

    def test_heartbeat_while_busy(self):
        """the heartbeat answers within a second while a cell computes and the checker is busy"""
        msg_id = self.client.execute("const stop = Date.now() + 1500; while (Date.now() < stop);")
        socket = zmq.Context.instance().socket(zmq.REQ)
        socket.linger = 0
        socket.connect(f"tcp://{self.manager.ip}:{self.manager.hb_port}")
        for _ in range(20):
            socket.send(b"beat")
            self.assertTrue(socket.poll(1000))
            self.assertEqual(socket.recv(), b"beat")
            time.sleep(0.05)
        socket.close()
        Exchange(self.client, msg_id)

    def test_completion_positions(self):
        """positions count code points, with astral letters before, inside and after, and CR LF"""
        for before, name, after in (
            ("", "Math.hyp", ""),
            ('"😀𝔼"; ', "Math.hyp", " /* 😀 */"),
            ("/* 😀 */\r\n/* 𝔼𝔼 */\r\n", "Math.hyp", "\r\n1"),
        ):
            with self.subTest(before=before):
                cursor = len(before) + len(name)
                content = self.ask("complete_request", {"code": before + name + after, "cursor_pos": cursor}).content
                self.assertIn("hypot", content["matches"])
                self.assertEqual((content["cursor_start"], content["cursor_end"]), (cursor - 3, cursor))
                types = content["metadata"]["_jupyter_types_experimental"]
                self.assertEqual([t["text"] for t in types], content["matches"])
                self.assertEqual({(t["start"], t["end"]) for t in types}, {(cursor - 3, cursor)})

    def test_completion_runs_nothing(self):
        """completion runs no code of the user"""
        self.run_cell('let touched = 0; const trap = { get inner() { touched += 1; return { deep: 1 } } }')
        self.ask("complete_request", {"code": "trap.inner.", "cursor_pos": 11})
        self.assertEqual(self.run_cell("touched").of("execute_result")[0]["data"]["text/plain"], "0")

    def test_odd_positions(self):
        """out-of-range, negative, fractional and missing positions get an answer"""
        for position in (-5, 10**300, 2.5, None, "x", True):
            for kind in ("complete_request", "inspect_request"):
                with self.subTest(kind=kind, position=position):
                    self.assertEqual(self.ask(kind, {"code": "Math", "cursor_pos": position}).content["status"], "ok")

    def test_inspect(self):
        """inspection finds a name at its end and inside the parentheses of a call; text/plain is there"""
        for code, position in (("Math.hypot", 10), ("Math.hypot(1, ", 14), ("/* 😀 */ Math.hypot", 18)):
            with self.subTest(code=code):
                content = self.ask("inspect_request", {"code": code, "cursor_pos": position, "detail_level": 0}).content
                self.assertTrue(content["found"])
                self.assertIn("hypot", content["data"]["text/plain"])
        nothing = self.ask("inspect_request", {"code": "   ", "cursor_pos": 1, "detail_level": 1}).content
        self.assertEqual((nothing["found"], nothing["data"]), (False, {}))

    def test_is_complete(self):
        """is_complete parses only, and answers within a second"""
        for code, status in (
            ("1 + 1", "complete"),
            ("const n: number = 'x'", "complete"),
            ("if (true) {", "incomplete"),
            ("`open", "incomplete"),
            ("/* open", "incomplete"),
            ("1 +", "incomplete"),
            ("f(1,", "incomplete"),
            (")", "invalid"),
        ):
            with self.subTest(code=code):
                started = time.time()
                content = self.ask("is_complete_request", {"code": code}).content
                self.assertLess(time.time() - started, 1)
                self.assertEqual(content["status"], status)
                self.assertEqual("indent" in content, status == "incomplete")

    def test_history(self):
        """history by tail, range and search, oldest first, with the real session number"""
        for code in ("101", "102", "103"):
            self.run_cell(code)
        self.run_cell("104", silent=True)
        self.run_cell("105", store_history=False)
        tail = self.ask("history_request", {"hist_access_type": "tail", "n": 2, "raw": True, "output": False}).content
        self.assertEqual([entry[2] for entry in tail["history"]], ["102", "103"])
        session, line, _ = tail["history"][0]
        one = {"hist_access_type": "range", "session": session, "start": line, "stop": line + 1, "raw": True, "output": True}
        self.assertEqual(self.ask("history_request", one).content["history"], [[session, line, ["102", "102"]]])
        found = self.ask("history_request", {"hist_access_type": "search", "pattern": "10[(*", "n": 5}).content
        self.assertEqual(found["history"], [])
        found = self.ask("history_request", {"hist_access_type": "search", "pattern": "10?", "unique": True}).content
        self.assertEqual([entry[2] for entry in found["history"]], ["101", "102", "103"])

    def test_comms(self):
        """an unknown comm target is closed; comm_info lists none; comm messages get busy and idle"""
        self.assertEqual(self.ask("comm_info_request", {}).content, {"status": "ok", "comms": {}})
        message = self.client.session.msg("comm_open", {"comm_id": "c", "target_name": "none", "data": {}})
        self.client.shell_channel.send(message)
        heard = []
        while "idle" not in heard:
            got = self.client.get_iopub_msg(timeout=SLOW)
            if got["parent_header"].get("msg_id") == message["header"]["msg_id"]:
                heard.append(got["content"].get("execution_state") or got["msg_type"])
        self.assertEqual(heard, ["busy", "comm_close", "idle"])

    def test_wrong_contents(self):
        """wrong contents get an error reply or a default, then idle"""
        for kind, content in (
            ("execute_request", {"code": 5}),
            ("execute_request", {}),
            ("complete_request", {"code": None}),
            ("inspect_request", {}),
            ("is_complete_request", {"code": []}),
            ("history_request", {"hist_access_type": "tail", "n": "many"}),
        ):
            with self.subTest(kind=kind, content=content):
                done = self.ask(kind, content)
                self.assertEqual(done.order, ["busy", "idle"])
                self.assertIn(done.content["status"], ("ok", "error"))

    def test_two_clients(self):
        """two clients at once: each gets its replies, both see everything"""
        other = BlockingKernelClient(connection_file=self.manager.connection_file)
        other.load_connection_file()
        other.start_channels()
        other.wait_for_ready(timeout=SLOW)
        mine, theirs = self.client.execute("const mine = 1; mine"), other.execute("const theirs = 2; theirs")
        mine_done, theirs_done = Exchange(self.client, mine), Exchange(other, theirs)
        self.assertEqual(mine_done.content["status"], "ok")
        self.assertEqual(theirs_done.content["status"], "ok")
        other.stop_channels()


class Control(unittest.TestCase):
    def setUp(self):
        self.manager, self.client = start()
        self.pid = self.manager.provisioner.pid

    def tearDown(self):
        self.client.stop_channels()
        if self.manager.is_alive():
            self.manager.shutdown_kernel(now=True)

    def run_cell(self, code, timeout=SLOW, **options):
        return Exchange(self.client, self.client.execute(code, **options), timeout=timeout)

    def test_interrupts(self):
        """interrupts end loops, waits, timers, catch-alls and print loops; state stays; twice in a row is harmless"""
        self.run_cell("let kept = 41")
        for code in (
            "for (;;);",
            "for (;;) { try { for (;;); } catch {} finally {} }",
            "await new Promise(() => {})",
            "await new Promise((r) => setTimeout(r, 60_000))",
            "for (;;) await null",
            "await 0; for (;;);",
            "for (;;) console.log(1)",
        ):
            with self.subTest(code=code):
                msg_id = self.client.execute(code)
                queued = self.client.execute("1")
                time.sleep(0.4)
                started = time.time()
                self.manager.interrupt_kernel()
                self.manager.interrupt_kernel()
                done = Exchange(self.client, msg_id)
                self.assertEqual(done.content["status"], "error")
                self.assertEqual(len(done.of("error")), 1)
                self.assertLess(time.time() - started, 8)
                self.assertEqual(Exchange(self.client, queued).content["status"], "error")
                self.assertEqual(self.run_cell("kept").of("execute_result")[0]["data"]["text/plain"], "41")

    def test_idle_interrupt(self):
        """an interrupt of an idle kernel has no effect on the next cell; SIGINT is one"""
        self.run_cell("1")
        self.manager.interrupt_kernel()
        os.kill(self.pid, signal.SIGINT)
        time.sleep(0.2)
        self.assertEqual(self.run_cell("2").content["status"], "ok")
        msg_id = self.client.execute("for (;;);")
        time.sleep(0.5)
        os.kill(self.pid, signal.SIGINT)
        self.assertEqual(Exchange(self.client, msg_id).content["status"], "error")

    def test_shutdown_while_busy(self):
        """shutdown while a cell spins: reply, exit within two seconds, with all children of user code"""
        self.client.execute('(await import("node:child_process")).spawn("sleep", ["600"], { stdio: "ignore" }); for (;;);')
        end = time.time() + SLOW
        while time.time() < end and not any("sleep" in open(f"/proc/{p}/cmdline").read() for p in descendants(self.pid)):
            time.sleep(0.05)
        family = [self.pid, *descendants(self.pid)]
        self.assertGreater(len(family), 3)
        message = self.client.session.msg("shutdown_request", {"restart": False})
        self.client.control_channel.send(message)
        reply = self.client.get_control_msg(timeout=5)
        self.assertEqual(reply["content"], {"status": "ok", "restart": False})
        self.manager.provisioner.process.wait(timeout=3)
        self.assertEqual(self.manager.provisioner.process.returncode, 0)
        self.assertTrue(gone(family, 2), [p for p in family if alive(p)])

    def test_signals(self):
        """SIGTERM and SIGHUP end the kernel in order, with its children"""
        for which in (signal.SIGTERM, signal.SIGHUP):
            with self.subTest(which=which):
                manager, client = start()
                pid = manager.provisioner.pid
                Exchange(client, client.execute("1"))
                family = [pid, *descendants(pid)]
                os.kill(pid, which)
                manager.provisioner.process.wait(timeout=3)
                self.assertEqual(manager.provisioner.process.returncode, 0)
                self.assertTrue(gone(family, 2))
                client.stop_channels()

    def test_killed_kernel(self):
        """kill -9 of the kernel leaves none of its children"""
        self.run_cell("1")
        family = descendants(self.pid)
        self.assertGreater(len(family), 1)
        os.kill(self.pid, signal.SIGKILL)
        self.assertTrue(gone(family, 3), [p for p in family if alive(p)])

    def test_restart(self):
        """a restart has a new session, counts from 1 and knows nothing"""
        self.run_cell("const old = 1")
        before = self.run_cell("old").reply["header"]["session"]
        self.manager.restart_kernel()
        self.client.wait_for_ready(timeout=SLOW)
        done = self.run_cell("typeof globalThis")
        self.assertEqual(done.content["execution_count"], 1)
        self.assertNotEqual(done.reply["header"]["session"], before)
        self.assertEqual(self.run_cell("old").content["status"], "error")


class Process(unittest.TestCase):
    def test_dead_host(self):
        """kill -9 of the host ends the kernel and all its children within two seconds, idle or busy"""
        for code in ("1", "for (;;);"):
            with self.subTest(code=code):
                host = f"""
import os, time
from jupyter_client.manager import start_new_kernel
manager, client = start_new_kernel(kernel_name="halfperiod", startup_timeout=60)
client.execute_interactive("0", timeout=60)
client.execute({code!r}); time.sleep(1)
print(manager.provisioner.pid, flush=True)
time.sleep(600)
"""
                process = subprocess.Popen([sys.executable, "-c", host], stdout=subprocess.PIPE)
                kernel = int(process.stdout.readline())
                family = [kernel, *descendants(kernel)]
                process.kill()
                process.wait()
                self.assertTrue(gone(family, 2.2), [p for p in family if alive(p)])

    def test_path_with_spaces(self):
        """the connection file may have spaces and letters in its path, and other ipc or tcp endpoints"""
        folder = tempfile.mkdtemp(prefix="half périod ")
        manager = KernelManager(kernel_name="halfperiod", connection_file=os.path.join(folder, "k 1.json"))
        manager.start_kernel()
        client = manager.client()
        client.start_channels()
        client.wait_for_ready(timeout=SLOW)
        self.assertEqual(Exchange(client, client.execute("1")).content["status"], "ok")
        client.stop_channels()
        manager.shutdown_kernel()

    def test_ipc(self):
        """the transport ipc works, and no socket file is left"""
        folder = tempfile.mkdtemp()
        manager = KernelManager(kernel_name="halfperiod", transport="ipc", ip=os.path.join(folder, "k"))
        manager.start_kernel()
        client = manager.client()
        client.start_channels()
        client.wait_for_ready(timeout=SLOW)
        self.assertEqual(Exchange(client, client.execute("1")).content["status"], "ok")
        client.stop_channels()
        manager.shutdown_kernel()
        self.assertEqual(os.listdir(folder), [])


if __name__ == "__main__":
    outcome = unittest.main(argv=[sys.argv[0], "-v", *sys.argv[1:]], exit=False).result
    sys.exit(0 if outcome.wasSuccessful() else 1)
