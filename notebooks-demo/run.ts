/**
 * `npm run demo`: executes the demo notebooks through the WebSocket kernel with JupyterLab's own client, prints what
 * each claim came to, and leaves executed copies and readable pages in `out/demo`.
 */
import { mkdir, readdir, readFile, writeFile } from "node:fs/promises";
import { join, relative } from "node:path";
import { type Kernel, KernelManager, ServerConnection } from "@jupyterlab/services";
import WebSocket from "ws";
import { printClaims } from "../kernel/commands/run.ts";
import { notebookToHtml } from "../kernel/display/notebook-html.ts";
import { type CellReply, type CellRunner, executeNotebook } from "../kernel/notebook/execute.ts";
import { OutputCollector } from "../kernel/notebook/outputs.ts";
import { readNotebook } from "../kernel/notebook/read.ts";
import { writeNotebook } from "../kernel/notebook/write.ts";
import { ThreadEvaluator } from "../kernel/session/thread.ts";
import { startServer } from "../kernel/transport/server.ts";

const source = import.meta.dirname;
const target = join(source, "..", "out", "demo");

/** Runs cells on a kernel that JupyterLab's client is connected to. */
class ClientRunner implements CellRunner {
  readonly #kernel: Kernel.IKernelConnection;
  readonly #collector = new OutputCollector();

  constructor(kernel: Kernel.IKernelConnection) {
    this.#kernel = kernel;
  }

  async execute(code: string) {
    const outputs = this.#collector.startCell();
    const future = this.#kernel.requestExecute({ code, stop_on_error: false });
    future.onIOPub = (message) => this.#collector.take(message);
    const reply = await future.done;
    return { reply: reply.content as unknown as CellReply, outputs };
  }
}

const server = await startServer({ port: 0, root: source, createEvaluator: () => new ThreadEvaluator() });
const manager = new KernelManager({
  serverSettings: ServerConnection.makeSettings({
    baseUrl: server.url,
    wsUrl: server.url.replace(/^http/, "ws"),
    token: server.token,
    appendToken: true,
    WebSocket: WebSocket as unknown as typeof globalThis.WebSocket,
  }),
});
await mkdir(target, { recursive: true });
let failures = 0;
for (const name of (await readdir(source)).filter((file) => file.endsWith(".ipynb")).sort()) {
  const read = readNotebook(await readFile(join(source, name), "utf8"));
  if ("problem" in read) throw new Error(`${name}: ${read.problem}`);
  process.stdout.write(`\n${name}\n`);
  const kernel = await manager.startNew({ name: "twoplace" });
  const { notebook, failed } = await executeNotebook(read.notebook, new ClientRunner(kernel), printClaims);
  await kernel.shutdown();
  failures += failed.length;
  for (const { number, ename, evalue } of failed)
    process.stderr.write(`cell ${number}: ${ename}: ${evalue}\n`);
  const stem = name.replace(/\.ipynb$/, "");
  await writeFile(join(target, name), writeNotebook(notebook));
  await writeFile(join(target, `${stem}.html`), notebookToHtml(notebook, stem));
}
process.stdout.write(`\nExecuted notebooks and pages are in ${relative(process.cwd(), target)}.\n`);
manager.dispose();
await server.close();
// The client keeps timers after it is disposed of, so the process would not end by itself.
process.exit(failures === 0 ? 0 : 1);
