"""How a kernel is stopped, restarted and ended, and what it needs of its host.

Each test stands for one rule of the messaging protocol; the text of the rule is its docstring.
"""
import os
import signal
import socket
import subprocess
import sys
import tempfile
import time
import unittest

from common import SLOW, Exchange, alive, descendants, family, gone, hears, host_that_dies, run, start
from jupyter_client.manager import KernelManager


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
                msg_id = self.client.execute(f'console.error("begun"); {code}')
                queued = self.client.execute("1")
                hears(self.client, msg_id, "stream")
                self.manager.interrupt_kernel()
                self.manager.interrupt_kernel()
                done = Exchange(self.client, msg_id)
                self.assertEqual(done.content["status"], "error")
                self.assertEqual((done.content["ename"], len(done.of("error"))), ("Interrupted", 1))
                self.assertEqual(Exchange(self.client, queued).content["status"], "error")
                self.assertEqual(self.run_cell("kept").of("execute_result")[0]["data"]["text/plain"], "41")

    def test_idle_interrupt(self):
        """an interrupt of an idle kernel has no effect on the next cell; SIGINT is one"""
        self.run_cell("1")
        self.manager.interrupt_kernel()
        os.kill(self.pid, signal.SIGINT)
        for _ in range(3):  # behind the interrupts, as the kernel serves control in order and takes signals between
            message = self.client.session.msg("kernel_info_request", {})
            self.client.control_channel.send(message)
            Exchange(self.client, message["header"]["msg_id"], "control")
        self.assertEqual(self.run_cell("2").content["status"], "ok")
        msg_id = self.client.execute('console.log("begun"); for (;;);')
        hears(self.client, msg_id, "stream")
        os.kill(self.pid, signal.SIGINT)
        self.assertEqual(Exchange(self.client, msg_id).content["status"], "error")

    def test_shutdown_while_busy(self):
        """shutdown while a cell spins: reply, exit within two seconds, with all children of user code"""

        def attempt():
            manager, client = start()
            pid = manager.provisioner.pid
            code = 'const child = (await import("node:child_process")).spawn("sleep", ["600"], { stdio: "ignore" });'
            msg_id = client.execute(f"{code} console.log(child.pid); for (;;);")
            child = int(hears(client, msg_id, "stream")["content"]["text"])
            processes = family(manager)
            self.assertIn(child, processes)
            self.assertGreater(len(processes), 3)
            message = client.session.msg("shutdown_request", {"restart": False})
            sent = time.time()
            client.control_channel.send(message)
            reply = client.get_control_msg(timeout=SLOW)
            self.assertEqual(reply["content"], {"status": "ok", "restart": False})
            manager.provisioner.process.wait(timeout=SLOW)
            self.assertEqual(manager.provisioner.process.returncode, 0)
            self.assertTrue(gone(processes, SLOW), [p for p in processes if alive(p)])
            took.append(time.time() - sent)
            client.stop_channels()

        took = []
        while len(took) < 3 and (not took or min(took) > 2):
            attempt()
        self.assertLess(min(took), 2)

    def test_signals(self):
        """SIGTERM and SIGHUP end the kernel in order, with its children"""
        for which in (signal.SIGTERM, signal.SIGHUP):
            with self.subTest(which=which):
                manager, client = start()
                pid = manager.provisioner.pid
                Exchange(client, client.execute("1"))
                processes = family(manager)
                os.kill(pid, which)
                manager.provisioner.process.wait(timeout=SLOW)
                self.assertEqual(manager.provisioner.process.returncode, 0)
                self.assertTrue(gone(processes, SLOW))
                client.stop_channels()

    def test_killed_kernel(self):
        """kill -9 of the kernel leaves none of its children"""
        self.run_cell("1")
        processes = descendants(self.pid)
        self.assertGreater(len(processes), 1)
        os.kill(self.pid, signal.SIGKILL)
        self.assertTrue(gone(processes, SLOW), [p for p in processes if alive(p)])

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
        for code in ('console.log("begun")', 'console.log("begun"); for (;;);'):
            with self.subTest(code=code):
                took = []
                while len(took) < 3 and (not took or min(took) > 2):
                    processes, killed = host_that_dies("halfperiod", code)
                    self.assertGreater(len(processes), 2)
                    self.assertTrue(gone(processes, SLOW), [p for p in processes if alive(p)])
                    took.append(time.time() - killed)
                self.assertLess(min(took), 2)

    def test_path_with_spaces(self):
        """the connection file may have spaces and letters in its path, and other ipc or tcp endpoints"""
        folder = tempfile.mkdtemp(prefix="half périod ")
        manager, client = start(manager=KernelManager(kernel_name="halfperiod", connection_file=os.path.join(folder, "k 1.json")))
        self.assertEqual(Exchange(client, client.execute("1")).content["status"], "ok")
        client.stop_channels()
        manager.shutdown_kernel()

    def test_restarts(self):
        """restart after restart: no process is left, the ports are the same and free each time"""
        manager, client = start()
        ports = {name: getattr(manager, name) for name in ("shell_port", "iopub_port", "control_port", "hb_port")}
        for turn in range(int(os.environ.get("HALFPERIOD_TEST_RESTARTS", "12"))):
            if turn % 4 == 0:
                Exchange(client, client.execute("1"))
            processes = family(manager)
            manager.restart_kernel()
            client.wait_for_ready(timeout=SLOW)
            self.assertTrue(gone(processes, SLOW), [p for p in processes if alive(p)])
            self.assertEqual(ports, {name: getattr(manager, name) for name in ports})
        processes = family(manager)
        client.stop_channels()
        manager.shutdown_kernel()
        self.assertTrue(gone(processes, SLOW))
        for port in ports.values():
            with socket.create_server(("127.0.0.1", port)):
                pass

    def test_every_address(self):
        """a host that asks for all addresses of the machine gets them, and the kernel serves as ever"""
        manager, client = start(manager=KernelManager(kernel_name="halfperiod", ip="0.0.0.0"))
        self.assertEqual(Exchange(client, client.execute("1")).content["status"], "ok")
        client.stop_channels()
        manager.shutdown_kernel()

    def test_taken_port(self):
        """a taken port: one line and a status that is not zero, at once, and no other port is tried"""
        with socket.create_server(("127.0.0.1", 0)) as taken:
            manager = KernelManager(kernel_name="halfperiod")
            manager.control_port = taken.getsockname()[1]
            manager.cache_ports = False
            manager.start_kernel(stderr=subprocess.PIPE)
            process = manager.provisioner.process
            said = process.stderr.read()
            self.assertEqual(process.wait(timeout=SLOW), 1)
            self.assertRegex(said.decode(), r"\Ahalfperiod: control socket: [^\n]* cannot be bound [^\n]*\n\Z")
            manager.cleanup_connection_file()

    def test_container(self):
        """where the host is process 1 the kernel lives, and it ends with that host"""
        unshare = ["unshare", "--pid", "--fork", "--mount-proc", "--kill-child"]
        if subprocess.run([*unshare, "true"], capture_output=True).returncode:
            self.skipTest("no namespaces here")
        host = """
import os, time
from jupyter_client.manager import start_new_kernel
assert os.getpid() == 1
manager, client = start_new_kernel(kernel_name="halfperiod", startup_timeout=60)
reply = client.execute_interactive("6 * 7", timeout=60)
time.sleep(2)
assert manager.is_alive() and client.execute_interactive("1", timeout=60)["content"]["status"] == "ok"
manager.shutdown_kernel()
print("lived", reply["content"]["status"])
"""
        done = subprocess.run([*unshare, sys.executable, "-c", host], capture_output=True, text=True)
        self.assertIn("lived ok", done.stdout, done.stderr)

    def test_place(self):
        """it works in the folder that the host chose, without a terminal and with its standard input closed"""
        folder = tempfile.mkdtemp(prefix="working place ")
        manager, client = start(cwd=folder, stdin=subprocess.DEVNULL)
        shown = Exchange(client, client.execute("process.cwd()")).of("execute_result")[0]["data"]["text/plain"]
        self.assertIn(folder, shown)
        closed = Exchange(client, client.execute("process.stdin.isTTY ?? false")).of("execute_result")[0]["data"]
        self.assertEqual(closed["text/plain"], "false")
        client.stop_channels()
        manager.shutdown_kernel()

    def test_ipc(self):
        """the transport ipc works, and no socket file is left"""
        folder = tempfile.mkdtemp()
        manager, client = start(manager=KernelManager(kernel_name="halfperiod", transport="ipc", ip=os.path.join(folder, "k")))
        self.assertEqual(Exchange(client, client.execute("1")).content["status"], "ok")
        client.stop_channels()
        manager.shutdown_kernel()
        self.assertEqual(os.listdir(folder), [])


if __name__ == "__main__":
    run()
