import { defineConfig } from "vitest/config";

// Two levels (README, "Tests"): `fast` needs Node alone and takes under two minutes; `full` adds what needs other
// programs, sockets or long corpora. A file's name decides: *.test.ts is fast, *.full.test.ts is full.
export default defineConfig({
  test: {
    testTimeout: 120_000,
    hookTimeout: 60_000,
    // Without it, a machine with two cores would use one.
    maxWorkers: 2,
    projects: [
      {
        extends: true,
        test: { name: "fast", include: ["tests/**/*.test.ts"], exclude: ["tests/**/*.full.test.ts"] },
      },
      { extends: true, test: { name: "full", include: ["tests/**/*.full.test.ts"], testTimeout: 600_000 } },
    ],
  },
});
