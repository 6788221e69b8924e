/** The kernels of a server, and the sessions, which are names that front ends give to them. */
import { v4 as uuid } from "uuid";
import type { Evaluator } from "../session/evaluator.ts";
import { type KernelModel, ServedKernel } from "./served-kernel.ts";

interface SessionEntry {
  readonly id: string;
  path: string;
  name: string;
  type: string;
  kernel: string;
}

/** What the REST side tells of a session. */
export interface SessionModel {
  readonly id: string;
  readonly path: string;
  readonly name: string;
  readonly type: string;
  readonly kernel: KernelModel;
}

/** More kernels than this are not started: each has a thread of its own. */
const MOST_KERNELS = 64;

export class Kernels {
  readonly started = new Date();
  readonly #createEvaluator: () => Evaluator;
  readonly #log: (line: string) => void;
  readonly #kernels = new Map<string, ServedKernel>();
  readonly #sessions = new Map<string, SessionEntry>();

  constructor(createEvaluator: () => Evaluator, log: (line: string) => void) {
    this.#createEvaluator = createEvaluator;
    this.#log = log;
  }

  get models(): KernelModel[] {
    return [...this.#kernels.values()].map((kernel) => kernel.model);
  }

  get sessionModels(): SessionModel[] {
    return [...this.#sessions.keys()].flatMap((id) => this.findSession(id) ?? []);
  }

  /** A new kernel; null when there are too many. */
  start(): ServedKernel | null {
    if (this.#kernels.size >= MOST_KERNELS) return null;
    const kernel = new ServedKernel({
      createEvaluator: this.#createEvaluator,
      onShutdown: () => void this.remove(kernel.id),
      log: this.#log,
    });
    this.#kernels.set(kernel.id, kernel);
    return kernel;
  }

  find(id: string): ServedKernel | null {
    return this.#kernels.get(id) ?? null;
  }

  /** Ends a kernel, and the sessions with it. @returns false when there is none of that id */
  async remove(id: string): Promise<boolean> {
    const kernel = this.#kernels.get(id);
    if (kernel === undefined) return false;
    this.#kernels.delete(id);
    for (const session of this.#sessions.values()) {
      if (session.kernel === id) this.#sessions.delete(session.id);
    }
    await kernel.close(1000, "the kernel was shut down");
    return true;
  }

  findSession(id: string): SessionModel | null {
    const session = this.#sessions.get(id);
    const kernel = session === undefined ? undefined : this.#kernels.get(session.kernel);
    if (session === undefined || kernel === undefined) return null;
    const { path, name, type } = session;
    return { id, path, name, type, kernel: kernel.model };
  }

  /** The session of a path, if there is one: a path has one session at most. */
  findSessionOfPath(path: string): SessionModel | null {
    const found = [...this.#sessions.values()].find((session) => session.path === path);
    return found === undefined ? null : this.findSession(found.id);
  }

  /** A new session for a kernel that is there. */
  addSession(session: Omit<SessionEntry, "id">): SessionModel {
    const id = uuid();
    this.#sessions.set(id, { id, ...session });
    return this.findSession(id)!;
  }

  /** Changes what is given; the kernel must be there. @returns null when there is no such session */
  changeSession(id: string, changes: Partial<Omit<SessionEntry, "id">>): SessionModel | null {
    const session = this.#sessions.get(id);
    if (session === undefined) return null;
    Object.assign(session, changes);
    return this.findSession(id);
  }

  /** Ends all kernels. */
  async close(): Promise<void> {
    const kernels = [...this.#kernels.values()];
    this.#kernels.clear();
    this.#sessions.clear();
    await Promise.all(kernels.map((kernel) => kernel.close(1001, "the server is going away")));
  }
}
