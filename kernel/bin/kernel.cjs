// The kernel, as hosts start it: `node kernel.cjs -f FILE`.
"use strict";
require("./load.cjs").start("kernel", "kernel/service/main.js");
