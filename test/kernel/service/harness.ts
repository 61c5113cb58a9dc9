// A kernel in this process, with fake cells, and clients on real sockets.

import { type Kernel, startKernel } from "../../../kernel/service/kernel.ts";
import { parseConnection } from "../../../kernel/wire/connection.ts";
import type { RequestChannel } from "../../../kernel/wire/wire.ts";
import { Client, type ConnectionFields, freeConnection } from "../client.ts";
import { FakeCells } from "./fake_cells.ts";

export interface TestKernel {
  readonly kernel: Kernel;
  readonly fields: ConnectionFields;
  readonly client: Client;
  readonly cells: FakeCells;
  /** Resolves when so many more messages have come in on a channel than before `send`, whose value it gives. */
  taken<T>(channel: RequestChannel, count: number, send: () => Promise<T>): Promise<T>;
  /** Another client, connected. */
  another(): Promise<Client>;
  stop(): Promise<void>;
}

/** `change`: fields of the connection file; `serverKey`: the kernel's public key if they ask for encryption. */
export async function startTestKernel(change: object = {}, serverKey?: string): Promise<TestKernel> {
  const fields = { ...(await freeConnection()), ...change };
  let cells: FakeCells | undefined;
  const kernel = await startKernel(parseConnection(JSON.stringify(fields), "test.json"), {
    createCells: async (options) => {
      cells = new FakeCells(options);
      return cells;
    },
  });
  const clients: Client[] = [];
  const another = async () => {
    const client = await new Client(fields, serverKey).connect();
    clients.push(client);
    return client;
  };
  const client = await another();
  await client.request("shell", "kernel_info_request");
  return {
    kernel,
    fields,
    client,
    cells: cells!,
    another,
    async taken(channel, count, send) {
      const before = kernel.received[channel];
      const sent = await send();
      while (kernel.received[channel] < before + count) await new Promise((resolve) => setTimeout(resolve, 1));
      return sent;
    },
    async stop() {
      for (const each of clients) each.close();
      kernel.end();
      await kernel.ended;
    },
  };
}
