"""The checks that both kernels are given. Each takes a fresh kernel and raises what it finds wrong."""
import json
import os
import signal
import socket
import subprocess
import sys
import threading

import zmq

sys.path.insert(0, os.path.join(os.path.dirname(os.path.dirname(os.path.abspath(__file__))), "hosts", "protocol"))
from common import GARBAGE, Exchange, Gate, Relay, alive, ask, bare, connection_of, descendants, family, frames_of, gone, half_messages, hears, host_that_dies, start  # noqa: E402
from jupyter_client.manager import KernelManager  # noqa: E402
from protocol_cells import CELLS  # noqa: E402

LIMIT = 60


class Kernel:
    """A kernel under test, and its ways to say things in its language."""

    def __init__(self, name):
        self.name = name
        self.cells = CELLS[name]
        self.manager, self.client = start(name)
        self.pid = self.manager.provisioner.pid
        self.connection = connection_of(self.manager)
        self.sockets = []

    def close(self):
        for each in self.sockets:
            each.close(linger=0)
        self.client.stop_channels()
        processes = family(self.manager)
        if self.manager.is_alive():
            self.manager.shutdown_kernel(now=True)
        for pid in processes:
            if alive(pid):
                os.kill(pid, signal.SIGKILL)

    def run(self, code, **options):
        return Exchange(self.client, self.client.execute(code, **options), timeout=LIMIT)

    def value(self, code):
        return self.run(code).of("execute_result")[0]["data"]["text/plain"]

    def ask(self, kind, content, channel="shell"):
        return ask(self.client, kind, content, channel, timeout=LIMIT)

    def raw(self, channel, kind=zmq.DEALER):
        connected = bare(self.manager, kind, channel, rcvtimeo=LIMIT * 1000)
        self.sockets.append(connected)
        return connected

    def frames(self, kind, content, **header):
        return frames_of(self.client, kind, content, **header)

    def serves(self):
        """Shell and control still answer, and a cell still runs."""
        for channel in ("shell", "control"):
            assert self.ask("kernel_info_request", {}, channel).content["status"] == "ok"
        assert self.value("6 * 7") == "42"


def order_of_a_request(k):
    done = k.run(k.cells["then"](k.cells["print"]("a"), "6 * 7"))
    assert done.order == ["busy", "execute_input", "stream", "execute_result", "idle"], done.order


def two_streams_in_order(k):
    texts = "".join(c["text"] for c in k.run(k.cells["both"]).of("stream"))
    assert texts == "".join(f"o{i}\ne{i}\n" for i in range(20)), texts


def parent_is_the_whole_header(k):
    shell = k.raw("shell")
    _, frames = k.frames("kernel_info_request", {}, more={"a": [1, None]})
    shell.send_multipart([b"via", b"", *frames])
    reply = shell.recv_multipart()
    assert reply[:3] == [b"via", b"", b"<IDS|MSG>"], reply[:3]
    assert json.loads(reply[5])["more"] == {"a": [1, None]}


def kernel_info_on_control(k):
    shell, control = k.ask("kernel_info_request", {}), k.ask("kernel_info_request", {}, "control")
    assert shell.content == control.content and control.order == ["busy", "idle"]


def control_while_a_cell_computes(k):
    gate = Gate()
    msg_id = k.client.execute(k.cells["gate"](gate.path))
    hears(k.client, msg_id, "stream")
    try:
        k.ask("kernel_info_request", {}, "control")
    finally:
        gate.open()
    Exchange(k.client, msg_id)


def heartbeat_while_a_cell_computes(k):
    gate = Gate()
    msg_id = k.client.execute(k.cells["gate"](gate.path))
    hears(k.client, msg_id, "stream")
    beats = k.raw("hb", zmq.REQ)
    beats.send(b"beat")
    assert beats.recv() == b"beat"
    gate.open()
    Exchange(k.client, msg_id)


def unknown_types(k):
    for channel in (k.client.shell_channel, k.client.control_channel):
        for kind in ("unheard_request", "__class__", "toString"):
            message = k.client.session.msg(kind, {})
            channel.send(message)
            states = [hears(k.client, message["header"]["msg_id"], "status")["content"]["execution_state"] for _ in "ab"]
            assert states == ["busy", "idle"], states


def silent_publishes_nothing(k):
    done = k.run(k.cells["then"](k.cells["print"]("x"), "5"), silent=True)
    assert done.order == ["busy", "idle"], done.order


def counting(k):
    counts = [k.run("1", **o).content["execution_count"] for o in ({}, {"store_history": False}, {"silent": True}, {})]
    assert counts[1] == counts[2] == counts[0] and counts[3] == counts[0] + 1, counts


def error_as_in_the_reply(k):
    done = k.run(k.cells["fail"])
    error = done.of("error")[0]
    assert set(error) == {"ename", "evalue", "traceback"} and all(done.content[n] == error[n] for n in error)
    assert "execution_count" in done.content


def error_with_a_lone_surrogate(k):
    assert k.run(k.cells["surrogate"]).content["status"] == "error"


def abort_of_what_waits(k):
    gate = Gate()
    relay = Relay(k.connection["shell_port"])
    client = relay.client(k.manager)
    first = client.execute(k.cells["then"](k.cells["gate"](gate.path), k.cells["fail"]))
    rest = [client.execute(k.cells["print"](f"never {i}")) for i in range(10)]
    info = client.kernel_info()
    relay.wait_for(info)
    gate.open()
    replies = {}
    while len(replies) < 12:
        message = client.get_shell_msg(timeout=LIMIT)
        replies[message["parent_header"]["msg_id"]] = message["content"]["status"]
    client.stop_channels()
    assert replies.pop(info) == "ok"
    assert "ok" not in replies.values(), replies
    assert first in replies and all(i in replies for i in rest)


def what_is_sent_after_the_failure_runs(k):
    for _ in range(60):
        k.run(k.cells["fail"])
        assert k.run("1").content["status"] == "ok"


def stop_on_error_false(k):
    first, second = k.client.execute(k.cells["fail"], stop_on_error=False), k.client.execute("8")
    Exchange(k.client, first)
    assert Exchange(k.client, second).content["status"] == "ok"


def user_expressions(k):
    done = k.run(k.cells["define"], user_expressions={"good": "kept + 1", "bad": "no_such_name"})
    found = done.content["user_expressions"]
    assert found["good"]["data"]["text/plain"] == "42" and found["bad"]["status"] == "error"


def ten_megabytes_in_few_messages(k):
    done = k.run(k.cells["megabytes"])
    assert done.text() == "".join(str(i).rjust(99, ".") + "\n" for i in range(100_000))
    assert len(done.of("stream")) < 1000, len(done.of("stream"))


def interrupts_keep_the_state(k):
    k.run(k.cells["define"])
    for code in ("spin", "sleep"):
        msg_id = k.client.execute(k.cells[code])
        hears(k.client, msg_id, "stream")
        k.manager.interrupt_kernel()
        assert Exchange(k.client, msg_id).content["status"] == "error"
    assert k.value("kept") == "41"


def idle_interrupt(k):
    k.manager.interrupt_kernel()
    os.kill(k.pid, signal.SIGINT)
    for _ in range(3):
        k.ask("kernel_info_request", {}, "control")
    assert k.run("1").content["status"] == "ok"


def completion_counts_code_points(k):
    code, match, length = k.cells["complete"]
    content = k.ask("complete_request", {"code": code, "cursor_pos": len(code)}).content
    chosen = [m for m in content["matches"] if m.endswith(match)]
    assert chosen and content["cursor_end"] == len(code), content
    assert (code[: content["cursor_start"]] + chosen[0]).endswith(match) and "metadata" in content


def inspection(k):
    code, word = k.cells["inspect"]
    content = k.ask("inspect_request", {"code": code, "cursor_pos": len(code), "detail_level": 0}).content
    assert content["found"] and word in content["data"]["text/plain"]


def odd_positions(k):
    for position in (-5, 10**6, 2.5, None):
        for kind in ("complete_request", "inspect_request"):
            assert k.ask(kind, {"code": "abc", "cursor_pos": position}).content["status"] == "ok", (kind, position)


def wrong_contents(k):
    for kind, content in (("execute_request", {"code": 5}), ("execute_request", {}), ("is_complete_request", {"code": []})):
        done = k.ask(kind, content)
        assert done.order == ["busy", "idle"], done.order


def completeness(k):
    for status in ("complete", "incomplete", "invalid"):
        for code in k.cells[status + "_code"]:
            content = k.ask("is_complete_request", {"code": code}).content
            assert content["status"] == status and ("indent" in content) == (status == "incomplete"), (code, content)


def history_in_order(k):
    for code in ("101", "102"):
        k.run(code)
    k.run("104", store_history=False)
    content = k.ask("history_request", {"hist_access_type": "tail", "n": 2, "raw": True, "output": False}).content
    assert [entry[2] for entry in content["history"]] == ["101", "102"]
    session, line, _ = content["history"][0]
    one = {"hist_access_type": "range", "session": session, "start": line, "stop": line + 1, "raw": True, "output": False}
    assert [entry[2] for entry in k.ask("history_request", one).content["history"]] == ["101"]


def unknown_comm_target(k):
    message = k.client.session.msg("comm_open", {"comm_id": "c", "target_name": "none", "data": {}})
    k.client.shell_channel.send(message)
    assert hears(k.client, message["header"]["msg_id"], "comm_close")["content"]["comm_id"] == "c"


def garbage(k):
    for channel in ("shell", "control", "stdin"):
        sender = k.raw(channel)
        for frames in (*GARBAGE, [b"x"] * 9):
            sender.send_multipart(frames)
    k.serves()


def garbage_on_the_heartbeat(k):
    k.raw("hb").send_multipart([b"x"] * 9)
    beats = k.raw("hb", zmq.REQ)
    beats.send(b"beat")
    assert beats.recv() == b"beat"


def forged_messages(k):
    _, good = k.frames("shutdown_request", {"restart": False})
    at = good.index(b"<IDS|MSG>")
    for channel in ("shell", "control"):
        k.raw(channel).send_multipart([*good[: at + 1], b"0" * 64, *good[at + 2 :]])
        k.raw(channel).send_multipart([*good[: at + 1], b"", *good[at + 2 :]])
    k.serves()


def replayed_messages(k):
    k.run(k.cells["define"])
    msg_id, frames = k.frames("execute_request", {"code": "kept += 1"})
    first = k.raw("shell")
    first.send_multipart(frames)
    first.recv_multipart()
    k.raw("shell").send_multipart(frames)
    k.serves()
    assert k.value("kept") == "42", k.value("kept")


def half_messages_on_every_socket(k):
    for channel in ("shell", "control", "stdin", "iopub", "hb"):
        for data in half_messages():
            with socket.create_connection(("127.0.0.1", k.connection[channel + "_port"])) as connected:
                connected.sendall(data)
    k.serves()


def hundreds_of_connections(k):
    silent = [socket.create_connection(("127.0.0.1", k.connection["shell_port"])) for _ in range(300)]
    for _ in range(50):
        k.raw("shell").send_multipart(k.frames("kernel_info_request", {})[1])
    k.serves()
    for each in silent:
        each.close()


def late_text_of_a_cell(k):
    starter = k.client.execute(k.cells["late"])
    Exchange(k.client, starter)
    other = k.client.execute(k.cells["pause"])
    while True:
        message = k.client.get_iopub_msg(timeout=LIMIT)
        if message["msg_type"] == "stream":
            assert message["parent_header"]["msg_id"] == starter, "it came with another cell as its parent"
        if message["content"].get("execution_state") == "idle" and message["parent_header"]["msg_id"] == other:
            return


def shutdown_while_busy_with_children(k):
    msg_id = k.client.execute(k.cells["child"])
    child = int(hears(k.client, msg_id, "stream")["content"]["text"])
    family = [k.pid, child, *descendants(k.pid)]
    k.client.control_channel.send(k.client.session.msg("shutdown_request", {"restart": False}))
    assert k.client.get_control_msg(timeout=10)["content"]["status"] == "ok"
    k.manager.provisioner.process.wait(timeout=10)
    try:
        assert gone(family, 5), f"left: {[p for p in family if alive(p)]}"
    finally:
        if alive(child):
            os.kill(child, signal.SIGKILL)


def death_of_the_host(k):
    processes, _ = host_that_dies(k.name, k.cells["spin"])
    try:
        assert gone(processes, 6), "it lives on"
    finally:
        for pid in processes:
            if alive(pid):
                os.kill(pid, signal.SIGKILL)


def taken_port(k):
    with socket.create_server(("127.0.0.1", 0)) as taken:
        manager = KernelManager(kernel_name=k.name)
        manager.hb_port = taken.getsockname()[1]
        manager.cache_ports = False
        manager.start_kernel(stderr=subprocess.PIPE)
        process = manager.provisioner.process
        said = []
        reader = threading.Thread(target=lambda: said.append(process.stderr.read()), daemon=True)
        reader.start()
        try:
            assert process.wait(timeout=30) != 0
        finally:
            manager.shutdown_kernel(now=True)


CHECKS = [check for name, check in list(globals().items()) if callable(check) and getattr(check, "__code__", None)
          and check.__code__.co_filename == os.path.abspath(__file__) and check.__code__.co_varnames[:1] == ("k",)]
