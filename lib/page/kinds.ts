// The one table of how each class of values is shown. A class must stand above the classes it extends.

import { Figure } from "../figure/figure.ts";
import { figureKind } from "./figure-kind.ts";
import { entry, type KindEntry } from "./kind.ts";
import { Table } from "./table.ts";
import { tableKind } from "./table-kind.ts";

export const KINDS: readonly KindEntry[] = [entry(Table, tableKind), entry(Figure, figureKind)];
