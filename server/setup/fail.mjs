/** Something that the person who started this can mend: told in one line, without a stack. */
export class SetupError extends Error {}

/** Runs a script’s main function; an error of ours ends it with one line and a non-zero exit. */
export async function runScript(main) {
  try {
    await main();
  } catch (error) {
    console.error(error instanceof SetupError ? `trimwick: ${error.message}` : error);
    process.exitCode = 1;
  }
}
