/**
 * Canonical forms against Debian's `nauty-labelg` (package `nauty`), on the same files.
 *
 *     npx tsx tests/benchmarks/isomorphism.ts
 *
 * Each file has digraphs (digraph6) or graphs (graph6) of one size, one on a line; both sides read it, bring every one
 * to canonical form and write those in the same format. CPU time, user and system: ours in this process, the mean of
 * five runs after two to warm up; theirs of whole processes, by the shell's `time`, the mean of ten. Ratios are ours by
 * theirs. That both sides find the same number of classes is checked; the forms themselves differ, as each program
 * chooses its own. Random digraphs and graphs come from a seeded generator; the graphs on 8 points are all there are,
 * written by `nauty-geng`.
 */
import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { Points } from "../../lib/carriers/points.ts";
import { Meter } from "../../lib/logic/meter.ts";
import { Canoniser } from "../../lib/structures/canonical.ts";
import { enumerateStructures } from "../../lib/structures/search.ts";
import { readSentences } from "../support/corpora.ts";

const PROGRAM = "nauty-labelg";
/** What both formats add to six bits, or to a small size, to make a character. */
const OFFSET = 63;
const RUNS = 5;
const THEIR_RUNS = 10;

interface Sample {
  readonly name: string;
  readonly file: string;
  readonly count: number;
}

/** Random numbers from 0 to below 1, the same on every machine (Lehmer's generator with 48271, Park & Miller 1993). */
function randomNumbers(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 48271) % 2147483647;
    return state / 2147483647;
  };
}

/** One structure in digraph6 or graph6. */
function encodeGraph(size: number, table: Uint8Array, directed: boolean): string {
  const bits: number[] = [];
  if (directed) bits.push(...table);
  else for (let j = 1; j < size; j += 1) for (let i = 0; i < j; i += 1) bits.push(table[i * size + j]!);
  let text = (directed ? "&" : "") + String.fromCharCode(OFFSET + size);
  for (let from = 0; from < bits.length; from += 6) {
    let value = 0;
    for (let at = from; at < from + 6; at += 1) value = value * 2 + (bits[at] ?? 0);
    text += String.fromCharCode(OFFSET + value);
  }
  return text;
}

/** The whole way from file to file, as `nauty-labelg` goes it. */
function canoniseFile(input: string, output: string): void {
  const bytes = readFileSync(input);
  const written = new Uint8Array(bytes.length);
  const directed = bytes[0] === "&".charCodeAt(0);
  const size = bytes[directed ? 1 : 0]! - OFFSET;
  const table = new Uint8Array(size * size);
  const canoniser = new Canoniser(size, [2]);
  let at = 0;
  let out = 0;
  while (at < bytes.length) {
    for (let head = directed ? 2 : 1; head > 0; head -= 1) written[out++] = bytes[at++]!;
    let bits = 0;
    let left = 0;
    if (directed)
      for (let kind = 0; kind < table.length; kind += 1) {
        if (left === 0) {
          bits = bytes[at++]! - OFFSET;
          left = 6;
        }
        left -= 1;
        table[kind] = (bits >> left) & 1;
      }
    else
      for (let j = 1; j < size; j += 1)
        for (let i = 0; i < j; i += 1) {
          if (left === 0) {
            bits = bytes[at++]! - OFFSET;
            left = 6;
          }
          left -= 1;
          table[i * size + j] = (bits >> left) & 1;
          table[j * size + i] = (bits >> left) & 1;
        }
    canoniser.canoniseToBytes([table]);
    const { order } = canoniser;
    bits = 0;
    left = 6;
    for (let column = directed ? 0 : 1; column < size; column += 1)
      for (let row = 0; row < (directed ? size : column); row += 1) {
        left -= 1;
        // For graphs it does not matter which of the two comes first.
        bits |= table[order[column]! * size + order[row]!]! << left;
        if (left > 0) continue;
        written[out++] = bits + OFFSET;
        bits = 0;
        left = 6;
      }
    if (left < 6) written[out++] = bits + OFFSET;
    written[out++] = bytes[at++]!;
  }
  writeFileSync(output, written.subarray(0, out));
}

function cpuOf(work: () => void): number {
  const before = process.cpuUsage();
  work();
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1000;
}

/** CPU time in milliseconds of one run, the mean over so many. */
function timeTheirs(input: string, output: string): number {
  const script = `TIMEFORMAT='%3U %3S'; time for run in $(seq ${THEIR_RUNS}); do ${PROGRAM} -q "$0" "$1"; done`;
  const { stderr } = spawnSync("bash", ["-c", script, input, output], { encoding: "utf8" });
  const [user, system] = stderr.trim().split(/\s+/).slice(-2).map(Number);
  return ((user! + system!) * 1000) / THEIR_RUNS;
}

const classesIn = (file: string) => new Set(readFileSync(file, "latin1").trim().split("\n")).size;

if (spawnSync(PROGRAM, ["--help"], { stdio: "ignore" }).error !== undefined) {
  console.error(`${PROGRAM} is not installed (Debian package nauty)`);
  process.exit(2);
}
const folder = mkdtempSync(join(tmpdir(), "canonical-"));
const samples: Sample[] = [];

function sample(name: string, lines: readonly string[]): void {
  const file = join(folder, `${samples.length}.txt`);
  writeFileSync(file, `${lines.join("\n")}\n`);
  samples.push({ name, file, count: lines.length });
}

function randomLines(size: number, directed: boolean, count: number, seed: number): string[] {
  const random = randomNumbers(seed);
  return Array.from({ length: count }, () => {
    const density = [0.2, 0.35, 0.5][Math.floor(random() * 3)]!;
    const table = new Uint8Array(size * size);
    for (let i = 0; i < size; i += 1)
      for (let j = 0; j < (directed ? size : i); j += 1) {
        if (i === j || random() >= density) continue;
        table[i * size + j] = 1;
        if (!directed) table[j * size + i] = 1;
      }
    return encodeGraph(size, table, directed);
  });
}

/** The candidates that the count of a theory's models up to isomorphism canonises. */
function modelLines(axioms: readonly string[], size: number): string[] {
  const lines: string[] = [];
  const task = {
    carrier: new Points(size),
    sentences: readSentences(axioms),
    relations: [{ name: "R", places: 2, infix: false }],
  };
  enumerateStructures(task, new Meter(Number.MAX_SAFE_INTEGER / 1000), (structure) => {
    lines.push(encodeGraph(size, structure.tables.get("R")!.holds, true));
    return true;
  });
  return lines;
}

/** Digraphs in which it depends on y − x modulo n whether there is an arc; all of them, or as many as asked for. */
function circulantLines(size: number, count: number): string[] {
  return Array.from({ length: count }, (_, number) => {
    const table = new Uint8Array(size * size);
    for (let i = 0; i < size; i += 1)
      for (let j = 0; j < size; j += 1) {
        const step = (j - i + size) % size;
        if (step > 0) table[i * size + j] = ((number + 1) >> (step - 1)) & 1;
      }
    return encodeGraph(size, table, true);
  });
}

const transitive = "forall x y z. R(x,y) & R(y,z) -> R(x,z)";
for (const size of [5, 6, 7, 8, 9, 10, 12, 16, 20])
  sample(`random digraphs on ${size}`, randomLines(size, true, 50_000, size));
for (const size of [8, 9, 12, 16, 20])
  sample(`random graphs on ${size}`, randomLines(size, false, 50_000, size));
sample("partial orders on 7, candidates", modelLines(["forall x. ~R(x,x)", transitive], 7));
sample("transitive relations on 6, candidates", modelLines([transitive], 6).filter(isLoopless));
sample("digraphs of differences modulo 11", circulantLines(11, 1000));
sample("digraphs of differences modulo 12", circulantLines(12, 2000));
const all8 = spawnSync("nauty-geng", ["-q", "8"], { encoding: "utf8", maxBuffer: 1 << 28 });
if (all8.error === undefined) sample("all graphs on 8", all8.stdout.trim().split("\n"));

function isLoopless(line: string): boolean {
  const size = line.charCodeAt(1) - OFFSET;
  for (let i = 0; i < size; i += 1) {
    const kind = i * size + i;
    if ((((line.charCodeAt(2 + Math.floor(kind / 6)) - OFFSET) >> (5 - (kind % 6))) & 1) === 1) return false;
  }
  return true;
}

console.log("CPU milliseconds for a file");
console.log(`${"".padEnd(40)}${"number".padStart(8)}${"classes".padStart(9)}     ours   theirs   ratio`);
const ratios: number[] = [];
const output = join(folder, "out.txt");
for (const { name, file, count } of samples) {
  const theirs = timeTheirs(file, output);
  const expected = classesIn(output);
  for (let warm = 0; warm < 2; warm += 1) canoniseFile(file, output);
  const classes = classesIn(output);
  const ours =
    cpuOf(() => {
      for (let run = 0; run < RUNS; run += 1) canoniseFile(file, output);
    }) / RUNS;
  const wrong = classes !== expected;
  if (wrong) process.exitCode = 1;
  if (count > 2500) ratios.push(ours / theirs);
  console.log(
    name.padEnd(40) +
      String(count).padStart(8) +
      (wrong ? `WRONG ${classes}, ${expected}` : String(classes)).padStart(9) +
      ours.toFixed(1).padStart(9) +
      theirs.toFixed(1).padStart(9) +
      (ours / theirs).toFixed(2).padStart(8),
  );
}
rmSync(folder, { recursive: true });
const mean = Math.exp(ratios.reduce((sum, ratio) => sum + Math.log(ratio), 0) / ratios.length);
console.log(`geometric mean of the ratios, files of more than 2500: ${mean.toFixed(2)}`);
