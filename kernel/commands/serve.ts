/** `twoplace serve`: kernels over HTTP and WebSocket, on this machine only. */
import { ThreadEvaluator } from "../session/thread.ts";
import { startServer } from "../transport/server.ts";
import { EXIT_FINE, UnreadableInput } from "./exit.ts";

/** Serves until the process is asked to end. @returns the exit status */
export async function serve(options: { readonly port: number }): Promise<number> {
  const server = await startServer({
    port: options.port,
    root: process.cwd(),
    createEvaluator: () => new ThreadEvaluator(),
  }).catch((problem: NodeJS.ErrnoException) => {
    if (problem.code === "EADDRINUSE")
      throw new UnreadableInput(`port ${options.port} is in use; try another --port`);
    throw problem;
  });
  process.stdout.write(`${server.url}?token=${server.token}\n`);
  process.stderr.write("Twoplace is serving kernels to clients on this machine. Stop it with Ctrl-C.\n");
  await new Promise<void>((resolve) => {
    process.once("SIGINT", resolve);
    process.once("SIGTERM", resolve);
  });
  await server.close();
  return EXIT_FINE;
}
