/** Something that the person who started this can mend: told in one line, without a stack. */
export class SetupError extends Error {}

/** The line of a program’s output that says what went wrong. */
export function tellingLine(output) {
  const lines = output
    .split('\n')
    .map((line) => line.trim())
    .filter((line) => line !== '');
  return lines.find((line) => /\b(error|fatal|panic)\b/i.test(line)) ?? lines.at(-1) ?? 'it said nothing';
}

/** What is printed of an error: one line for what a person can mend, the whole stack for a defect of ours. */
export function told(error) {
  if (error instanceof SetupError) return `trimwick: ${error.message}`;
  // What the operating system refuses (no right, no room, no such folder) says itself in its message.
  if (error instanceof Error && typeof error.syscall === 'string') return `trimwick: ${error.message}`;
  return error;
}

/** Runs a script’s main function; an error of ours ends it with one line and a non-zero exit. */
export async function runScript(main) {
  try {
    await main();
  } catch (error) {
    console.error(told(error));
    process.exitCode = 1;
  }
}
