/** Runs Debian's `minisat` as a check on answers and a measure of speed. */
import { execFileSync, spawnSync } from "node:child_process";

export type NativeAnswer = "satisfiable" | "unsatisfiable" | "ended";

/** The package that has the program. */
export const NATIVE_PACKAGE = "minisat";

export function hasNativeSolver(): boolean {
  return spawnSync("minisat", ["--help"], { stdio: "ignore" }).error === undefined;
}

/** The answer to a DIMACS file. */
export function solveNatively(file: string): NativeAnswer {
  // The exit status is that of the SAT competitions: 10 satisfiable, 20 unsatisfiable.
  const { status } = spawnSync("minisat", ["-verb=0", file], { stdio: "ignore" });
  return status === 10 ? "satisfiable" : status === 20 ? "unsatisfiable" : "ended";
}

/** CPU time (user and system) in milliseconds of one run, the mean over so many, as the shell's `time` tells it. */
export function timeNatively(file: string, runs: number, option = "-verb=0"): number {
  const script = `TIMEFORMAT='%3U %3S'; time for run in $(seq ${runs}); do minisat -verb=0 "$1" "$0" >/dev/null; done`;
  const out = execFileSync("bash", ["-c", `{ ${script}; } 2>&1 >/dev/null; true`, file, option], {
    encoding: "utf8",
  });
  const [user, system] = out.trim().split(/\s+/).slice(-2).map(Number);
  return ((user! + system!) * 1000) / runs;
}
