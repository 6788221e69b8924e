// What a worker begins with when the kernel runs from its TypeScript sources: Node's threads do not take over the
// loader of the thread that starts them. A bundled kernel does not use this file.
import { workerData } from "node:worker_threads";
import { register } from "tsx/esm/api";

register();
await import(workerData.entry);
