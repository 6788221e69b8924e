#!/usr/bin/env node
// Starts the command line: the bundle if it has been built, else the sources through tsx, so that `npx twoplace`
// works in a clone right after `npm ci`.
import { existsSync } from "node:fs";

const bundle = new URL("../dist/cli.js", import.meta.url);
if (existsSync(bundle)) {
  const { main } = await import(bundle.href);
  await main(process.argv.slice(2));
} else {
  const { register } = await import("tsx/esm/api");
  register();
  const { main } = await import("./cli.ts");
  await main(process.argv.slice(2));
}
