/** Imports go down only (DEVELOPERS.md, "Architecture"). */
import { readdirSync, readFileSync } from "node:fs";
import { dirname, join, relative, resolve } from "node:path";
import ts from "typescript";
import { describe, expect, it } from "vitest";

const root = resolve(import.meta.dirname, "..");

/** For each folder, the folders that its files may import from, besides itself. */
const MAY_IMPORT: Readonly<Record<string, readonly string[]>> = {
  "lib/logic": [],
  "lib/language": ["lib/carriers", "lib/logic"],
  "lib/carriers": ["lib/logic"],
  "lib/evidence": ["lib/carriers", "lib/logic"],
  "lib/structures": ["lib/evidence", "lib/carriers", "lib/logic"],
  "lib/derivation": ["lib/evidence", "lib/logic"],
  "lib/inquiry": ["lib/structures", "lib/derivation", "lib/evidence", "lib/carriers", "lib/logic"],
  "kernel/display": ["kernel/session/evaluator.ts", "lib"],
  "kernel/session": ["kernel/display", "lib"],
  "kernel/protocol": ["kernel/session/evaluator.ts", "package.json"],
  "kernel/notebook": ["kernel/protocol"],
  "kernel/transport": ["kernel/notebook", "kernel/protocol", "kernel/session/evaluator.ts"],
  "kernel/commands": ["kernel", "lib"],
  kernel: ["kernel/commands", "kernel/protocol"],
};
/** Packages that `lib` may use; it knows nothing of Node, Jupyter, files or clocks. */
const LIB_PACKAGES = ["@noble/hashes"];

const files = ["lib", "kernel"].flatMap((top) =>
  readdirSync(join(root, top), { recursive: true, encoding: "utf8" })
    .map((file) => join(top, file))
    .filter((file) => file.endsWith(".ts")),
);

function importsOf(file: string): string[] {
  return ts.preProcessFile(readFileSync(join(root, file), "utf8")).importedFiles.map((i) => i.fileName);
}

function folderOf(file: string): string {
  return file.split("/").slice(0, -1).slice(0, 2).join("/");
}

describe("imports", () => {
  it("covers every folder of the program", () => {
    expect(files.length).toBeGreaterThan(20);
    for (const file of files) expect(Object.keys(MAY_IMPORT), file).toContain(folderOf(file));
  });

  it.each(files)("%s imports downwards only", (file) => {
    const own = folderOf(file);
    for (const target of importsOf(file)) {
      if (!target.startsWith(".")) {
        if (file.startsWith("lib/"))
          expect(
            LIB_PACKAGES.some((name) => target.startsWith(name)),
            `${file} uses ${target}`,
          ).toBe(true);
        continue;
      }
      const path = relative(root, resolve(root, dirname(file), target));
      const allowed = [own, ...MAY_IMPORT[own]!].some(
        (place) => path === place || path.startsWith(`${place}/`),
      );
      expect(allowed, `${file} imports ${path}`).toBe(true);
    }
  });
});

describe("files", () => {
  it.each(files)("%s is one idea: at most 700 lines", (file) => {
    expect(readFileSync(join(root, file), "utf8").split("\n").length).toBeLessThanOrEqual(700);
  });
});

describe("the checker of evidence", () => {
  /** Lines that are neither blank nor comment. */
  const codeLines = (file: string) =>
    readFileSync(join(root, file), "utf8")
      .split("\n")
      .filter((line) => !/^\s*($|\/\/|\/?\*)/.test(line)).length;

  /** A file and all that it imports for more than types, and what these import. */
  function closureOf(start: string): readonly string[] {
    const found = new Set<string>();
    const follow = (file: string): void => {
      if (found.has(file)) return;
      found.add(file);
      const text = readFileSync(join(root, file), "utf8").replaceAll(/^(im|ex)port type [^;]*;/gm, "");
      for (const { fileName } of ts.preProcessFile(text).importedFiles)
        if (fileName.startsWith(".")) follow(relative(root, resolve(root, dirname(file), fileName)));
    };
    follow(start);
    return [...found];
  }

  it("has less than 950 lines of code", () => {
    const lines = files.filter((file) => file.startsWith("lib/evidence/")).map(codeLines);
    expect(lines.reduce((sum, count) => sum + count, 0)).toBeLessThan(950);
  });

  it("stands on records of formulas, on carriers and on the meter, and on nothing else: less than 3,900 lines", () => {
    const closure = closureOf("lib/evidence/check.ts");
    const allowed =
      /^lib\/(evidence|carriers|logic\/records)\/[^/]+\.ts$|^lib\/logic\/(meter|structure-definition)\.ts$/;
    for (const file of closure) expect(file).toMatch(allowed);
    expect(closure.map(codeLines).reduce((sum, count) => sum + count, 0)).toBeLessThan(3900);
  });

  it("needs less than 1,300 of them for derivations", () => {
    const lines = closureOf("lib/evidence/derivation.ts").map(codeLines);
    expect(lines.reduce((sum, count) => sum + count, 0)).toBeLessThan(1300);
  });
});
