"""What a client sees of the cells that it has run: order, options, errors, output.

Each test stands for one rule of the messaging protocol; the text of the rule is its docstring.
"""
import json

from common import SLOW, Exchange, Gate, Relay, Shared, connection_of, run


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
        gate = Gate()
        msg_id = self.client.execute(f'console.log("early"); {gate.wait} "done"')
        self.client_hears(msg_id, "stream")
        gate.open()
        self.assertEqual(Exchange(self.client, msg_id).content["status"], "ok")

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
        gate = Gate()
        relay = Relay(connection_of(self.manager)["shell_port"])
        client = relay.client(self.manager)
        self.addCleanup(client.stop_channels)
        ids = [client.execute(f'{gate.wait} throw new Error("first")')]
        ids += [client.execute(f'console.log("never {i}")') for i in range(20)]
        info = client.kernel_info()
        relay.wait_for(info)
        gate.open()
        replies = {}
        while len(replies) < len(ids) + 1:
            message = client.get_shell_msg(timeout=SLOW)
            replies[message["parent_header"]["msg_id"]] = message
        self.assertEqual(replies[info]["msg_type"], "kernel_info_reply")
        for msg_id in ids:
            self.assertEqual(replies[msg_id]["content"]["status"], "error")
            self.assertIn("execution_count", replies[msg_id]["content"])
        states = {msg_id: [] for msg_id in ids}
        while states[ids[-1]] != ["busy", "idle"]:
            message = self.client.get_iopub_msg(timeout=SLOW)
            if message["parent_header"].get("msg_id") in states:
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
        gate = Gate()
        starter = self.run_cell(f"""
            const files = await import("node:fs");
            const over = new Promise<void>((resolve) => {{
                const look = setInterval(() => {{
                    if (!files.existsSync({json.dumps(gate.path)})) return;
                    clearInterval(look);
                    console.log("late");
                    setTimeout(() => {{ setTimeout(resolve); throw new Error("in timer") }});
                }}, 5);
            }});
        """)
        gate.open()
        other = self.client.execute('await over; console.log("own")')
        heard = []
        while (other, "idle") not in heard:
            message = self.client.get_iopub_msg(timeout=SLOW)
            content = message["content"]
            said = content.get("execution_state") or content.get("text") or message["msg_type"]
            heard.append((message["parent_header"]["msg_id"], said))
        late = [said for parent, said in heard if parent == starter.id]
        self.assertEqual(late[0], "late\n")
        self.assertIn("in timer", "".join(late[1:]))
        self.assertNotIn("busy", late)
        self.assertEqual([said for parent, said in heard if parent == other], ["busy", "execute_input", "own\n", "idle"])
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
        read, peak = 0, 0
        while read < 40_000_000:
            read += len(self.client.get_iopub_msg(timeout=SLOW)["content"].get("text", ""))
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


if __name__ == "__main__":
    run()
