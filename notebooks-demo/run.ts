/**
 * `npm run demo`: executes the demo notebooks through the WebSocket kernel with JupyterLab's own client, prints what
 * each claim came to, and leaves executed copies and readable pages in `out/demo`.
 */
import { mkdir, readdir, readFile, writeFile } from "node:fs/promises";
import { join, relative } from "node:path";
import { printClaims } from "../kernel/commands/run.ts";
import { notebookToHtml } from "../kernel/display/notebook-html.ts";
import { executeNotebook } from "../kernel/notebook/execute.ts";
import { readNotebook } from "../kernel/notebook/read.ts";
import { writeNotebook } from "../kernel/notebook/write.ts";
import { ThreadEvaluator } from "../kernel/session/thread.ts";
import { startServer } from "../kernel/transport/server.ts";
import { ConnectionRunner, kernelManagerFor } from "../tests/support/client-connection.ts";

const source = import.meta.dirname;
const target = join(source, "..", "out", "demo");

// The client says on the console when sockets open and kernels end, which is nothing a reader of the demo needs.
console.debug = () => undefined;
console.warn = () => undefined;

const server = await startServer({ port: 0, root: source, createEvaluator: () => new ThreadEvaluator() });
const manager = kernelManagerFor(server);
await mkdir(target, { recursive: true });
let failures = 0;
for (const name of (await readdir(source)).filter((file) => file.endsWith(".ipynb")).sort()) {
  const read = readNotebook(await readFile(join(source, name), "utf8"));
  if ("problem" in read) throw new Error(`${name}: ${read.problem}`);
  process.stdout.write(`\n${name}\n`);
  const kernel = await manager.startNew({ name: "twoplace" });
  const { notebook, failed } = await executeNotebook(
    read.notebook,
    new ConnectionRunner(kernel),
    printClaims,
  );
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
