// The process of the cells, as the kernel starts it: `node FLAGS cells.cjs FOLDER`.
"use strict";
require("./load.cjs").start("cells", "kernel/cell/child/main.js");
