/** The file that a kernel's worker thread runs. */
import { Session } from "./session.ts";
import { serveEvaluator } from "./worker-serve.ts";

serveEvaluator(Session);
