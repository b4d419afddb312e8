/** One line to the person at the terminal. */
export const say = (line) => process.stdout.write(`${line}\n`);

/** A clear sentence and the end. */
export class SetupProblem extends Error {}

/** Runs the command's main function; a set-up problem ends it with its sentence, anything else with its stack. */
export async function runCommand(main) {
  try {
    await main();
  } catch (error) {
    process.exitCode = 1;
    process.stderr.write(error instanceof SetupProblem ? `\n${error.message}\n` : `\n${error?.stack ?? error}\n`);
  }
}

export const seconds = (since) => `${((Date.now() - since) / 1000).toFixed(1)} s`;
