/** The files under one folder, shown to front ends, not written. */
import { readdir, readFile, realpath, stat } from "node:fs/promises";
import { join, sep } from "node:path";
import { readNotebook } from "../notebook/read.ts";
import { failure, type RestResponse } from "./rest.ts";

/** Larger files are not shown. */
const MOST_BYTES = 64 * 1024 * 1024;

/**
 * Answers `GET /api/contents/…`: a folder's list, a notebook, or a file as text or base64.
 * @param root the folder; nothing outside it is shown, whatever a link in it points to
 * @param path the parts of the path below it, decoded
 */
export async function readContents(
  root: string,
  path: readonly string[],
  query: URLSearchParams,
): Promise<RestResponse> {
  const parts = path.filter((part) => part !== "");
  if (parts.at(-1) === "checkpoints") return { status: 200, body: [] };
  const shown = parts.join("/");
  const absent = failure(404, `there is no file ${shown}`);
  // Hidden files are not shown; that takes care of `.` and `..` too.
  if (parts.some((part) => part.startsWith(".") || /[/\\\0]/.test(part))) return absent;
  try {
    const home = await realpath(root);
    const file = await realpath(join(home, ...parts));
    if (file !== home && !file.startsWith(home.endsWith(sep) ? home : home + sep)) return absent;
    return await describeFile(file, parts, query.get("content") !== "0", query.get("format"));
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code === "ENOENT" || code === "ENOTDIR" || code === "ELOOP" || code === "ENAMETOOLONG") return absent;
    if (code === "EACCES" || code === "EPERM") return failure(403, `the file ${shown} may not be read`);
    throw error;
  }
}

async function describeFile(
  file: string,
  parts: readonly string[],
  withContent: boolean,
  format: string | null,
): Promise<RestResponse> {
  const status = await stat(file);
  const name = parts.at(-1) ?? "";
  const common = {
    name,
    path: parts.join("/"),
    created: status.birthtime.toISOString(),
    last_modified: status.mtime.toISOString(),
    writable: false,
    mimetype: null,
    format: null,
    content: null,
  };
  if (status.isDirectory()) {
    if (!withContent) return { status: 200, body: { ...common, type: "directory" } };
    const content = await listFolder(file, parts);
    return { status: 200, body: { ...common, type: "directory", format: "json", content } };
  }
  if (!status.isFile()) return failure(404, `${common.path} is no file`);
  const type = name.endsWith(".ipynb") && format !== "text" && format !== "base64" ? "notebook" : "file";
  const sized = { ...common, type, size: status.size };
  if (!withContent) return { status: 200, body: sized };
  if (status.size > MOST_BYTES) {
    return failure(413, `${common.path} has ${status.size} bytes; at most ${MOST_BYTES} are shown`);
  }
  const bytes = await readFile(file);
  if (type === "notebook") {
    const read = readNotebook(bytes.toString("utf8"));
    if ("problem" in read) return failure(400, `${common.path}: ${read.problem}`);
    return { status: 200, body: { ...sized, format: "json", content: read.notebook } };
  }
  return { status: 200, body: { ...sized, ...spellBytes(bytes, format) } };
}

async function listFolder(folder: string, parts: readonly string[]): Promise<unknown[]> {
  const names = (await readdir(folder)).filter((name) => !name.startsWith(".")).sort();
  const models = await Promise.all(
    names.map(async (name) => {
      // Links are followed only when they are asked for by themselves, and then checked.
      const described = await describeFile(join(folder, name), [...parts, name], false, null).catch(
        () => null,
      );
      return described?.status === 200 ? described.body : null;
    }),
  );
  return models.filter((model) => model !== null);
}

/** Text where the bytes are UTF-8 and base64 is not asked for. */
function spellBytes(
  bytes: Buffer,
  format: string | null,
): { format: string; mimetype: string; content: string } {
  if (format !== "base64") {
    try {
      const content = new TextDecoder("utf-8", { fatal: true, ignoreBOM: true }).decode(bytes);
      return { format: "text", mimetype: "text/plain", content };
    } catch {
      // Not text: base64, as if that had been asked for.
    }
  }
  return { format: "base64", mimetype: "application/octet-stream", content: bytes.toString("base64") };
}
