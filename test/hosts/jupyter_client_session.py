"""One session of Python's jupyter_client with the kernel; prints what happened as JSON for the test beside it."""
import json
import os
import sys
from queue import Empty

from jupyter_client.manager import KernelManager

sys.path.insert(0, os.path.join(os.path.dirname(os.path.abspath(__file__)), "protocol"))
from common import descendants, gone, hears  # noqa: E402

class Session:
    def __init__(self):
        self.manager = KernelManager(kernel_name="halfperiod")
        self.manager.start_kernel(cwd=os.getcwd())
        self.connect()

    def connect(self):
        self.client = self.manager.client()
        self.client.start_channels()
        self.client.wait_for_ready(timeout=60)

    def pid(self):
        return self.manager.provisioner.pid

    def outputs(self, msg_id, timeout=60):
        """The iopub messages of a request up to its idle, as (type, content)."""
        heard = []
        while True:
            message = self.client.get_iopub_msg(timeout=timeout)
            if message["parent_header"].get("msg_id") != msg_id:
                continue
            heard.append((message["msg_type"], message["content"]))
            if heard[-1] == ("status", {"execution_state": "idle"}):
                return heard

    def execute(self, code, timeout=60):
        msg_id = self.client.execute(code)
        reply = self.client.get_shell_msg(timeout=timeout)
        while reply["parent_header"].get("msg_id") != msg_id:
            reply = self.client.get_shell_msg(timeout=timeout)
        heard = self.outputs(msg_id, timeout)
        data = [content["data"] for kind, content in heard if kind == "execute_result"]
        text = "".join(content["text"] for kind, content in heard if kind == "stream")
        errors = [content for kind, content in heard if kind == "error"]
        return {
            "order": [kind for kind, _ in heard],
            "states": [content["execution_state"] for kind, content in heard if kind == "status"],
            "reply": reply["content"],
            "data": data[0] if data else None,
            "text": text,
            "error": errors[0] if errors else None,
        }

    def interrupt(self, code):
        """Starts endless code, interrupts it when it has printed, and tells how it ended."""
        msg_id = self.client.execute(code)
        hears(self.client, msg_id, "stream")
        self.manager.interrupt_kernel()
        reply = self.client.get_shell_msg(timeout=30)
        heard = self.outputs(msg_id)
        return {"reply": reply["content"], "order": [kind for kind, _ in heard]}

    def complete(self, code, position):
        self.client.complete(code, position)
        reply = self.client.get_shell_msg(timeout=30)
        while reply["msg_type"] != "complete_reply":
            reply = self.client.get_shell_msg(timeout=30)
        return reply["content"]


def main():
    facts = {}
    session = Session()
    session.client.kernel_info()
    try:
        reply = session.client.get_shell_msg(timeout=10)
        facts["info"] = reply["content"]
        facts["plain"] = session.execute("1 + 1")
        facts["stream"] = session.execute('console.log("a"); console.error("b"); console.log("c")')
        facts["rich"] = session.execute("curve`y^2 + y = x^3 - x`")
        facts["picture"] = session.execute("figure.curve(curve`y^2 + y = x^3 - x`)")
        facts["type_error"] = session.execute('const wrong: number = "a"')
        facts["thrown"] = session.execute('\nthrow new RangeError("deliberate")')
        facts["after_error"] = session.execute("let kept = 41; kept + 1")
        facts["interrupt_loop"] = session.interrupt('console.log("begun"); while (true) {}')
        facts["interrupt_wait"] = session.interrupt('console.log("begun"); await new Promise(() => {})')
        facts["interrupt_timer"] = session.interrupt(
            'setTimeout(() => { console.log("begun"); while (true) {} }, 10); await new Promise(() => {})'
        )
        facts["after_interrupt"] = session.execute("kept")
        emoji = 'const party = "🎉🎉"; latt'
        facts["completion"] = session.complete(emoji, len(emoji))
        facts["completion_start"] = len(emoji) - len("latt")

        first = session.pid()
        session.client.stop_channels()
        session.manager.restart_kernel(now=False)
        session.connect()
        facts["restart_new_process"] = session.pid() != first
        facts["after_restart"] = session.execute("kept")
        facts["count_after_restart"] = session.execute("1")["reply"]["execution_count"]

        family = [session.pid()] + descendants(session.pid())
        facts["family_size"] = len(family)
        session.execute("setInterval(() => {}, 1000); 1")
        process = session.manager.provisioner.process
        session.client.stop_channels()
        session.manager.shutdown_wait_time = 60  # it is to go by itself: no signal before
        session.manager.shutdown_kernel(now=False)
        facts["shutdown_status"] = process.returncode
        facts["all_gone"] = gone(family, 30)
    except Empty:
        facts["timed_out"] = True
    finally:
        if session.manager.has_kernel:
            session.manager.shutdown_kernel(now=True)
        json.dump(facts, sys.stdout)


main()
