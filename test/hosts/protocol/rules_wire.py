"""What lies below the client: sockets, frames and bytes, from outside the process.

Each test stands for one rule of the messaging protocol; the text of the rule is its docstring.
"""
import json
import os
import random
import socket

import zmq
from common import GARBAGE, SLOW, Shared, bare, connection_of, family, frames_of, half_messages, hears, run


class Wire(Shared):
    """What lies below the client: sockets, frames and bytes, from outside the process."""

    def connection(self):
        return connection_of(self.manager)

    def raw(self, kind, channel, **options):
        connected = bare(self.manager, kind, channel, linger=5000, **options)
        self.addCleanup(connected.close)
        return connected

    def frames(self, kind, content, **header):
        return frames_of(self.client, kind, content, **header)

    def unharmed(self):
        """shell and control answer; nothing was published but what the two questions cause"""
        ids = []
        for channel in ("shell", "control"):
            done = self.ask("kernel_info_request", {}, channel)
            self.assertEqual(done.content["status"], "ok")
            ids.append(done.id)
        self.assertEqual(self.run_cell("6 * 7").of("execute_result")[0]["data"]["text/plain"], "42")

    def test_welcome(self):
        """each subscription is welcomed with its own topic, the same topic a second time too"""
        for topic in (b"", b"", b"stream.stdout", "π".encode()):
            listener = self.raw(zmq.SUB, "iopub")
            listener.subscribe(topic)
            frames = listener.recv_multipart()
            while json.loads(frames[3])["msg_type"] != "iopub_welcome":
                frames = listener.recv_multipart()
            self.assertEqual((frames[0], frames[1]), (topic, b"<IDS|MSG>"))
            self.assertEqual(json.loads(frames[4]), {})
            self.assertEqual(json.loads(frames[6]), {"subscription": topic.decode()})

    def test_frames(self):
        """identities come back in order, binary or empty; one topic on iopub; the parent is the header as sent"""
        listener = self.raw(zmq.SUB, "iopub")
        listener.subscribe(b"status")
        shell = self.raw(zmq.DEALER, "shell")
        listener.recv_multipart()
        _, frames = self.frames("kernel_info_request", {}, version="5.9", more={"α": [1, None]})
        shell.send_multipart([b"via", b"", b"\x00\xff", *frames, b"a buffer", b""])
        reply = shell.recv_multipart()
        self.assertEqual(reply[:4], [b"via", b"", b"\x00\xff", b"<IDS|MSG>"])
        header = json.loads(reply[5])
        self.assertEqual(set(header), {"msg_id", "session", "username", "date", "msg_type", "version"})
        self.assertTrue(all(isinstance(value, str) for value in header.values()))
        self.assertEqual(json.loads(reply[6]), json.loads(frames[2]))
        busy = listener.recv_multipart()
        self.assertEqual((busy[0], busy[1]), (b"status", b"<IDS|MSG>"))
        self.assertEqual(json.loads(busy[4]), json.loads(frames[2]))

    def test_unknown_types(self):
        """unknown types are tolerated on shell and control: busy, idle, no reply"""
        for channel in (self.client.shell_channel, self.client.control_channel):
            for kind in ("unheard_request", "__proto__", "constructor", "create_subshell_request", "debug_request"):
                message = self.client.session.msg(kind, {})
                channel.send(message)
                heard = [hears(self.client, message["header"]["msg_id"], "status") for _ in range(2)]
                self.assertEqual([m["content"]["execution_state"] for m in heard], ["busy", "idle"])
        self.unharmed()

    def test_garbage(self):
        """garbage frames on each socket: no effect, and the next request is served"""
        rng = random.Random(7)
        for channel in ("shell", "control", "stdin", "hb"):
            sender = self.raw(zmq.DEALER, channel)
            for frames in GARBAGE:
                sender.send_multipart(frames)
            for _ in range(100):
                sender.send_multipart([rng.randbytes(rng.randrange(300)) for _ in range(rng.randrange(1, 9))])
        upstream = self.raw(zmq.XSUB, "iopub")
        for data in (b"", b"\x02", b"\x00none", b"\x01\xff\xfe", rng.randbytes(500)):
            upstream.send(data)
        self.unharmed()

    def test_wrong_keys(self):
        """a wrong key, no signature, a changed byte: not run, not answered, nothing published"""
        _, good = self.frames("execute_request", {"code": 'throw new Error("forged")'})
        at = good.index(b"<IDS|MSG>")
        wrong = [[*good[: at + 1], b"0" * 64, *good[at + 2 :]], [*good[: at + 1], b"", *good[at + 2 :]]]
        wrong.append([*good[:-1], good[-1].replace(b"forged", b"Forged")])
        _, shutdown = self.frames("shutdown_request", {"restart": False})
        wrong.append([*shutdown[: at + 1], shutdown[at + 1][::-1], *shutdown[at + 2 :]])
        for channel in ("shell", "control"):
            self.unharmed()
            sender = self.raw(zmq.DEALER, channel)
            msg_id, last = self.frames("kernel_info_request", {})
            for frames in [*wrong, last]:  # on one connection, so the good one is read when all others have been
                sender.send_multipart(frames)
            self.assertEqual(json.loads(sender.recv_multipart()[3])["msg_id"], msg_id)
            published = [self.client.get_iopub_msg(timeout=SLOW) for _ in range(2)]
            self.assertEqual([m["parent_header"].get("msg_id") for m in published], [msg_id, msg_id])
        self.unharmed()

    def test_replay(self):
        """a recorded message works once, from whatever socket it comes again"""
        self.run_cell("let replayed = 0")
        msg_id, frames = self.frames("execute_request", {"code": "replayed += 1"})
        first = self.raw(zmq.DEALER, "shell")
        first.send_multipart(frames)
        first.recv_multipart()
        hears(self.client, msg_id, "execute_result")
        for channel in ("shell", "shell", "control"):
            self.raw(zmq.DEALER, channel).send_multipart(frames)
        self.unharmed()
        self.assertEqual(self.run_cell("replayed").of("execute_result")[0]["data"]["text/plain"], "1")

    def test_huge_requests(self):
        """JSON of many megabytes, nested thousands deep, with an endless name: an answer or a drop, and on it goes"""
        big = self.run_cell(f'"{"x" * 5_000_000}".length')
        self.assertEqual(big.of("execute_result")[0]["data"]["text/plain"], "5000000")
        deep = json.loads("[" * 900 + "]" * 900)
        self.assertEqual(self.ask("kernel_info_request", {"deep": deep}).content["status"], "ok")
        self.assertEqual(self.ask("kernel_info_request", {"n" * 3_000_000: 1e300}).content["status"], "ok")
        _, frames = self.frames("execute_request", {"code": "0"})
        frames[-1] = b"[" * 2_000_000 + b"]" * 2_000_000
        frames[frames.index(b"<IDS|MSG>") + 1] = self.client.session.sign(frames[-4:])
        self.raw(zmq.DEALER, "shell").send_multipart(frames)
        self.unharmed()

    def test_half_messages(self):
        """half greetings, half frames, old greetings, other protocols, clients that vanish in the middle: no effect"""
        for channel in ("shell", "control", "stdin", "iopub", "hb"):
            port = self.connection()[channel + "_port"]
            for data in half_messages():
                with socket.create_connection(("127.0.0.1", port)) as connected:
                    connected.sendall(data)
        self.unharmed()

    def test_hundreds_of_connections(self):
        """hundreds of connections at once, silent ones and asking ones, that all vanish"""
        silent = [socket.create_connection(("127.0.0.1", self.connection()["shell_port"])) for _ in range(300)]
        clients = [self.raw(zmq.DEALER, "shell") for _ in range(100)]
        for each in clients:
            each.send_multipart(self.frames("kernel_info_request", {})[1])
        for each in clients[:50]:
            self.assertIn(b"<IDS|MSG>", each.recv_multipart())
        for each in clients:
            each.close(linger=0)
        self.unharmed()
        for each in silent:
            each.close()
        self.unharmed()

    def test_clients_that_vanish(self):
        """a client that is gone before its reply, in a cell and at a question, disturbs nobody"""
        for content in ({"code": "1"}, {"code": 'await ask("x?")', "allow_stdin": True}):
            gone_client = self.raw(zmq.DEALER, "shell")
            msg_id, frames = self.frames("execute_request", content)
            gone_client.send_multipart(frames)
            hears(self.client, msg_id, "execute_input")
            gone_client.close(linger=0)
            if "allow_stdin" in content:
                self.manager.interrupt_kernel()
        self.unharmed()

    def test_addresses(self):
        """it listens on the given address only"""
        processes = family(self.manager)
        inodes = set()
        for pid in processes:
            for fd in os.listdir(f"/proc/{pid}/fd"):
                try:
                    link = os.readlink(f"/proc/{pid}/fd/{fd}")
                except FileNotFoundError:
                    continue
                if link.startswith("socket:["):
                    inodes.add(link[8:-1])
        listening = set()
        for table in ("tcp", "tcp6"):
            with open(f"/proc/net/{table}") as file:
                for words in map(str.split, list(file)[1:]):
                    if words[3] == "0A" and words[9] in inodes:
                        listening.add((words[1].split(":")[0], int(words[1].split(":")[1], 16)))
        ports = {port for name, port in self.connection().items() if name.endswith("_port")}
        self.assertEqual(listening, {("0100007F", port) for port in ports})

    def test_key_stays_secret(self):
        """the key is on no command line and in no environment"""
        key = self.connection()["key"].encode()
        for pid in family(self.manager):
            for name in ("cmdline", "environ"):
                with open(f"/proc/{pid}/{name}", "rb") as file:
                    self.assertNotIn(key, file.read())


if __name__ == "__main__":
    run()
