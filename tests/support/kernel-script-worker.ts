/** A worker that runs the scripted evaluator. */
import { serveEvaluator } from "../../kernel/session/worker-serve.ts";
import { ScriptEvaluator } from "./kernel-script.ts";

serveEvaluator(ScriptEvaluator);
