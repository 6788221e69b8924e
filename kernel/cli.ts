/**
 * The command line. Results go to standard output, messages for people to standard error. The status is 0 when all
 * is well, 1 when a claim, cell or evidence failed, 2 for wrong usage or unreadable input.
 */
import { Command, CommanderError, InvalidArgumentError } from "commander";
import { evaluateText } from "./commands/eval.ts";
import { EXIT_USAGE, UnreadableInput } from "./commands/exit.ts";
import { recheck } from "./commands/recheck.ts";
import { runNotebook } from "./commands/run.ts";
import { serve } from "./commands/serve.ts";
import { KERNEL_VERSION } from "./protocol/kernel-info.ts";

const LARGEST_PORT = 65_535;

function port(text: string): number {
  const number = Number(text);
  if (!/^\d+$/.test(text) || number > LARGEST_PORT)
    throw new InvalidArgumentError(`a whole number from 0 to ${LARGEST_PORT} is wanted.`);
  return number;
}

function makeProgram(finish: (status: number) => void): Command {
  const program = new Command("twoplace")
    .description(
      "Checks axioms of a relation: each answer is established, refuted or open, and rests on evidence.",
    )
    .version(KERNEL_VERSION)
    .exitOverride()
    .showHelpAfterError();
  program
    .command("run")
    .description("execute a notebook through the kernel protocol")
    .argument("<notebook>", "a notebook of format 4")
    .option("--output <file>", "where the executed notebook goes; by default it takes the place of the first")
    .action(async (notebook: string, options: { output?: string }) =>
      finish(await runNotebook(notebook, options)),
    );
  program
    .command("eval")
    .description("evaluate the text of a cell")
    .argument("[file]", "a file, or - for standard input", "-")
    .option("--json", "print one array, with an object for each statement", false)
    .action(async (file: string, options: { json: boolean }) => finish(await evaluateText(file, options)));
  program
    .command("recheck")
    .description("verify the stored evidence of a notebook without searching")
    .argument("<notebook>", "a notebook that has been run")
    .action(async (notebook: string) => finish(await recheck(notebook)));
  program
    .command("serve")
    .description("start the kernel server and print its address with a token")
    .option("--port <number>", "the port to listen on; 0 takes a free one", port, 8787)
    .action(async (options: { port: number }) => finish(await serve(options)));
  return program;
}

/** Runs the command line and sets the process's exit status. */
export async function main(args: readonly string[]): Promise<void> {
  // A reader that has seen enough, like `head`, closes the pipe: that is no failure.
  process.stdout.on("error", (problem: NodeJS.ErrnoException) => {
    if (problem.code !== "EPIPE") throw problem;
    process.exit();
  });
  const program = makeProgram((status) => {
    process.exitCode = status;
  });
  try {
    await program.parseAsync(args, { from: "user" });
  } catch (problem) {
    if (problem instanceof CommanderError) {
      process.exitCode = problem.exitCode === 0 ? 0 : EXIT_USAGE;
    } else if (problem instanceof UnreadableInput) {
      process.stderr.write(`twoplace: ${problem.message}\n`);
      process.exitCode = EXIT_USAGE;
    } else throw problem;
  }
}
