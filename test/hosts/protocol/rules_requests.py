"""What a client gets for its other requests: completion, inspection, history, comms, kernel_info.

Each test stands for one rule of the messaging protocol; the text of the rule is its docstring.
"""
import os

import zmq
from common import SLOW, Exchange, Gate, Shared, at_best, run
from jupyter_client import BlockingKernelClient


class Requests(Shared):
    def test_kernel_info_on_both(self):
        """kernel_info has the same content on shell and control"""
        shell, control = self.ask("kernel_info_request", {}), self.ask("kernel_info_request", {}, "control")
        self.assertEqual(shell.content, control.content)
        self.assertEqual(shell.content["protocol_version"], shell.reply["header"]["version"])
        for done in (shell, control):
            self.assertEqual(done.order, ["busy", "idle"])

    def test_control_while_busy(self):
        """control answers while a cell computes without yielding: the cell goes on only after the answer"""
        gate = Gate()
        msg_id = self.client.execute(f'console.log("begun"); {gate.wait}')
        self.client_hears(msg_id, "stream")
        for _ in range(10):
            self.ask("kernel_info_request", {}, "control")
        gate.open()
        Exchange(self.client, msg_id)

    def test_heartbeat_while_busy(self):
        """the heartbeat answers, byte for byte, while a cell computes and the checker is busy"""
        gate = Gate()
        msg_id = self.client.execute(f'console.log("begun"); {gate.wait}')
        self.client_hears(msg_id, "stream")
        beats = zmq.Context.instance().socket(zmq.REQ)
        beats.linger = 0
        beats.connect(f"tcp://{self.manager.ip}:{self.manager.hb_port}")

        def beat():
            sent = os.urandom(9)
            beats.send(sent)
            self.assertTrue(beats.poll(60_000))
            self.assertEqual(beats.recv(), sent)

        at_best(0.25, beat, tries=20)
        gate.open()
        beats.close()
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
        for code in ("   ", "no_such_name"):
            nothing = self.ask("inspect_request", {"code": code, "cursor_pos": 1, "detail_level": 1}).content
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
                def attempt():
                    content = self.ask("is_complete_request", {"code": code}).content
                    self.assertEqual(content["status"], status)
                    self.assertEqual("indent" in content, status == "incomplete")

                at_best(1, attempt)

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

    def second_client(self):
        other = BlockingKernelClient(connection_file=self.manager.connection_file)
        other.load_connection_file()
        other.start_channels()
        other.wait_for_ready(timeout=SLOW)
        return other

    def test_two_clients(self):
        """two clients at once: each gets its replies, both see everything"""
        other = self.second_client()
        sent = [(who, who.execute(f"{n}")) for n in range(50) for who in (self.client, other)]
        for listener in (self.client, other):
            idle = set()
            while len(idle) < len(sent):
                message = listener.get_iopub_msg(timeout=SLOW)
                if message["content"].get("execution_state") == "idle":
                    idle |= {message["parent_header"]["msg_id"]} & {msg_id for _, msg_id in sent}
        for client in (self.client, other):
            got = [client.get_shell_msg(timeout=SLOW) for _ in range(50)]
            self.assertEqual([m["parent_header"]["msg_id"] for m in got], [i for who, i in sent if who is client])
            self.assertEqual({m["content"]["status"] for m in got}, {"ok"})
        other.stop_channels()

    def test_questions_of_two_clients(self):
        """a question goes to the client whose cell asks, several of one cell in order; another's answer does not count"""
        other = self.second_client()
        for asks, hears_nothing in ((self.client, other), (other, self.client)):
            msg_id = asks.execute('(await Promise.all([ask("a?"), ask("b?", { hidden: true })])).join("+")')
            for prompt, hidden, answer in (("a?", False, "1"), ("b?", True, "2")):
                question = asks.get_stdin_msg(timeout=SLOW)
                self.assertEqual(question["parent_header"]["msg_id"], msg_id)
                self.assertEqual(question["content"], {"prompt": prompt, "password": hidden})
                hears_nothing.input("foreign")
                asks.input(answer)
            shown = Exchange(asks, msg_id).of("execute_result")
            self.assertEqual(shown[0]["data"]["text/plain"], '"1+2"')
            self.assertEqual(hears_nothing.stdin_channel.socket.getsockopt(zmq.EVENTS) & zmq.POLLIN, 0)
        other.stop_channels()


if __name__ == "__main__":
    run()
