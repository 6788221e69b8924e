/**
 * The REST side of the server, as Jupyter's front ends ask for it (jupyter-server.readthedocs.io, "REST API"): a table
 * of methods and paths. Bodies are JSON whatever their type says, since clients send them as text.
 */
import * as v from "valibot";
import { KERNEL_DISPLAY_NAME, KERNEL_NAME, KERNEL_VERSION } from "../protocol/kernel-info.ts";
import { describeIssues } from "../protocol/schemas.ts";
import { readContents } from "./contents.ts";
import type { Kernels } from "./kernels.ts";
import { failure, type RestRequest, type RestResponse } from "./rest.ts";
import type { ServedKernel } from "./served-kernel.ts";

export interface RestContext {
  readonly kernels: Kernels;
  /** The folder whose files are shown; null for none. */
  readonly root: string | null;
}

/** A handler gets the parts of the path that stand at `:`. */
type Handler = (
  context: RestContext,
  request: RestRequest,
  ...parts: string[]
) => RestResponse | Promise<RestResponse>;

/** By path, then by method. A part `:` stands for any one part, a last part `*` for any number. */
const routes: Readonly<Record<string, Readonly<Record<string, Handler>>>> = {
  api: { GET: () => ok({ version: KERNEL_VERSION }) },
  "api/me": { GET: () => ok(me) },
  "api/status": { GET: ({ kernels }) => ok(statusOf(kernels)) },
  "api/kernelspecs": { GET: () => ok({ default: KERNEL_NAME, kernelspecs: { [KERNEL_NAME]: kernelSpec } }) },
  "api/kernelspecs/:": {
    GET: (_, __, name) => (name === KERNEL_NAME ? ok(kernelSpec) : missing(`kernel specification ${name}`)),
  },
  "api/kernels": { GET: ({ kernels }) => ok(kernels.models), POST: startKernel },
  "api/kernels/:": {
    GET: (context, _, id) => withKernel(context, id, (kernel) => ok(kernel.model)),
    DELETE: async ({ kernels }, _, id) =>
      (await kernels.remove(id!)) ? { status: 204 } : missing(`kernel ${id}`),
  },
  "api/kernels/:/interrupt": {
    POST: (context, _, id) =>
      withKernel(context, id, (kernel) => {
        kernel.interrupt();
        return { status: 204 };
      }),
  },
  "api/kernels/:/restart": {
    POST: (context, _, id) =>
      withKernel(context, id, async (kernel) => {
        await kernel.restart();
        return ok(kernel.model);
      }),
  },
  "api/sessions": { GET: ({ kernels }) => ok(kernels.sessionModels), POST: startSession },
  "api/sessions/:": {
    GET: ({ kernels }, _, id) => {
      const session = kernels.findSession(id!);
      return session === null ? missing(`session ${id}`) : ok(session);
    },
    PATCH: changeSession,
    DELETE: async ({ kernels }, _, id) => {
      const session = kernels.findSession(id!);
      if (session === null) return missing(`session ${id}`);
      await kernels.remove(session.kernel.id);
      return { status: 204 };
    },
  },
  "api/contents/*": {
    GET: ({ root }, { path, query }) =>
      root === null ? failure(404, "this server shows no files") : readContents(root, path.slice(2), query),
  },
  "api/terminals": { GET: noTerminals, POST: noTerminals },
  "api/terminals/*": { GET: noTerminals, DELETE: noTerminals },
};

const kernelSpec = {
  name: KERNEL_NAME,
  spec: {
    argv: [],
    display_name: KERNEL_DISPLAY_NAME,
    language: KERNEL_NAME,
    interrupt_mode: "message",
    env: {},
    metadata: {},
  },
  resources: {},
};

const me = {
  identity: {
    username: "local",
    name: "Local user",
    display_name: "Local user",
    initials: "L",
    avatar_url: null,
    color: null,
  },
  permissions: {},
};

/** Answers a request that has been let in. Mistakes of the client are answers too; nothing is thrown for them. */
export async function answerRest(context: RestContext, request: RestRequest): Promise<RestResponse> {
  const route = Object.keys(routes).find((pattern) => matches(pattern.split("/"), request.path));
  if (route === undefined) return failure(404, `there is nothing at /${request.path.join("/")}`);
  const methods = routes[route]!;
  const handler = Object.hasOwn(methods, request.method) ? methods[request.method] : undefined;
  if (handler === undefined) {
    const allowed = Object.keys(methods).join(", ");
    const answer = failure(405, `${request.method} is not allowed here; allowed: ${allowed}`);
    return { ...answer, headers: { Allow: allowed } };
  }
  const parts = route.split("/").flatMap((part, index) => (part === ":" ? [request.path[index]!] : []));
  return handler(context, request, ...parts);
}

function ok(body: unknown): RestResponse {
  return { status: 200, body };
}

function missing(what: string): RestResponse {
  return failure(404, `there is no ${what}`);
}

function noTerminals(): RestResponse {
  return failure(404, "this server has no terminals");
}

function matches(pattern: readonly string[], path: readonly string[]): boolean {
  if (pattern.at(-1) === "*") {
    const fixed = pattern.slice(0, -1);
    return path.length >= fixed.length && matches(fixed, path.slice(0, fixed.length));
  }
  return (
    pattern.length === path.length && pattern.every((part, index) => part === ":" || part === path[index])
  );
}

function withKernel(
  { kernels }: RestContext,
  id: string | undefined,
  work: (kernel: ServedKernel) => RestResponse | Promise<RestResponse>,
): RestResponse | Promise<RestResponse> {
  const kernel = kernels.find(id!);
  return kernel === null ? missing(`kernel ${id}`) : work(kernel);
}

function statusOf(kernels: Kernels): object {
  const { models } = kernels;
  const started = kernels.started.toISOString();
  const activities = models.map((model) => model.last_activity);
  return {
    started,
    last_activity: [started, ...activities].sort().at(-1),
    connections: models.reduce((sum, model) => sum + model.connections, 0),
    kernels: models.length,
  };
}

const optionalName = v.optional(v.nullable(v.string()));
const kernelRequest = v.object({ name: optionalName });
const sessionRequest = v.object({
  path: v.string(),
  name: v.optional(v.string(), ""),
  type: v.optional(v.string(), "notebook"),
  kernel: v.optional(v.nullable(v.object({ id: optionalName, name: optionalName }))),
});
const sessionChange = v.partial(sessionRequest, ["path"]);

/** A body by its schema, or the answer that says what is wrong with it. */
function readBody<S extends v.GenericSchema>(
  schema: S,
  body: unknown,
): { value: v.InferOutput<S> } | { refusal: RestResponse } {
  if (Array.isArray(body)) return { refusal: failure(400, "the body is malformed: expected an object") };
  const read = v.safeParse(schema, body ?? {});
  return read.success
    ? { value: read.output }
    : { refusal: failure(400, `the body is malformed: ${describeIssues(read.issues, "")}`) };
}

function startKernel({ kernels }: RestContext, request: RestRequest): RestResponse {
  const read = readBody(kernelRequest, request.body);
  if ("refusal" in read) return read.refusal;
  const started = startNamed(kernels, read.value.name);
  if ("refusal" in started) return started.refusal;
  const { model } = started.kernel;
  return { status: 201, headers: { Location: `/api/kernels/${model.id}` }, body: model };
}

/** A new kernel by the name of its specification; none is the default. */
function startNamed(
  kernels: Kernels,
  name: string | null | undefined,
): { kernel: ServedKernel } | { refusal: RestResponse } {
  if (typeof name === "string" && name !== "" && name !== KERNEL_NAME) {
    return { refusal: failure(404, `there is no kernel ${name}; this server has ${KERNEL_NAME}`) };
  }
  const kernel = kernels.start();
  return kernel === null
    ? { refusal: failure(503, "there are too many kernels; shut one down") }
    : { kernel };
}

function startSession({ kernels }: RestContext, request: RestRequest): RestResponse {
  const read = readBody(sessionRequest, request.body);
  if ("refusal" in read) return read.refusal;
  const { path, name, type, kernel } = read.value;
  const existing = kernels.findSessionOfPath(path);
  if (existing !== null) return { status: 201, body: existing };
  const chosen = chooseKernel(kernels, kernel ?? {});
  if ("refusal" in chosen) return chosen.refusal;
  const session = kernels.addSession({ path, name, type, kernel: chosen.kernel.id });
  return { status: 201, headers: { Location: `/api/sessions/${session.id}` }, body: session };
}

/** The kernel of a given id, or a new one by name. */
function chooseKernel(
  kernels: Kernels,
  { id, name }: { id?: string | null | undefined; name?: string | null | undefined },
): { kernel: ServedKernel } | { refusal: RestResponse } {
  if (typeof id !== "string") return startNamed(kernels, name);
  const kernel = kernels.find(id);
  return kernel === null ? { refusal: missing(`kernel ${id}`) } : { kernel };
}

/** Renames or moves a session, or gives it another kernel; the one it had ends if no other session has it. */
async function changeSession(
  { kernels }: RestContext,
  request: RestRequest,
  id?: string,
): Promise<RestResponse> {
  const before = kernels.findSession(id!);
  if (before === null) return missing(`session ${id}`);
  // Only what is in the body changes: the defaults of a new session are not for this.
  const given = typeof request.body === "object" && request.body !== null ? request.body : {};
  const read = readBody(sessionChange, given);
  if ("refusal" in read) return read.refusal;
  const { path, name, type, kernel } = read.value;
  const wantsKernel = kernel !== undefined && kernel !== null && (kernel.id ?? kernel.name ?? null) !== null;
  const chosen = wantsKernel && kernel.id !== before.kernel.id ? chooseKernel(kernels, kernel) : null;
  if (chosen !== null && "refusal" in chosen) return chosen.refusal;
  const changed = kernels.changeSession(id!, {
    ...(path === undefined ? {} : { path }),
    ...("name" in given ? { name } : {}),
    ...("type" in given ? { type } : {}),
    ...(chosen === null ? {} : { kernel: chosen.kernel.id }),
  });
  const isLeft = !kernels.sessionModels.some((session) => session.kernel.id === before.kernel.id);
  if (chosen !== null && isLeft) await kernels.remove(before.kernel.id);
  return ok(changed);
}
