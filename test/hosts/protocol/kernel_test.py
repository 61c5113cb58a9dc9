"""The front ends' own test of kernels, fed with TypeScript. Run by the test beside it."""
import sys
import unittest

import jupyter_kernel_test


class HalfperiodTests(jupyter_kernel_test.KernelTests):
    kernel_name = "halfperiod"
    language_name = "typescript"
    file_extension = ".ts"

    code_hello_world = 'console.log("hello, world")'
    code_stderr = 'console.error("to stderr")'
    completion_samples = [
        {"text": '"abc".toUpp', "matches": {"toUpperCase"}},
        {"text": "const length = 1; /* 😀𝔼 */ Math.hyp", "matches": {"hypot"}},
        {"text": "no_such_name_at_all."},
    ]
    complete_code_samples = ["1", "const a = { b: [1, 2] }", "function f() {\n  return 1\n}", "// only a remark", ""]
    incomplete_code_samples = ["for (;;) {", "const a = [1,", "f(`template", "/* remark", "1 +"]
    invalid_code_samples = ["}", "const a = )"]
    code_generate_error = 'throw new RangeError("deliberate")'
    code_execute_result = [
        {"code": "6 * 7", "result": "42"},
        {"code": "6 * 8", "result": "48"},
        {"code": "await Promise.resolve(3)", "result": "3"},
    ]
    code_display_data = [
        {"code": 'typeset(rational("1/2"))', "mime": "text/latex"},
        {"code": "typeset(figure.lattice(lattice({ tau: i })))", "mime": "image/svg+xml"},
    ]
    code_history_pattern = "6 * 7"
    supported_history_operations = ("tail", "range", "search")
    code_inspect_sample = "Math.hypot"
    code_page_something = "typeset(curve`y^2 = x^3 - x`, { aside: true })"
    code_clear_output = "console.clear()"

if __name__ == "__main__":
    outcome = unittest.main(argv=[sys.argv[0], "-v"], exit=False).result
    sys.exit(0 if outcome.wasSuccessful() and not outcome.skipped else 1)
