/** A failure that the reader can act on: shown as its sentence alone, without a stack. */
export class Stop extends Error {}

export function say(line) {
  process.stdout.write(`${line}\n`);
}

/** Runs an entry script: a Stop ends it with its sentence, anything else with its stack, both with code 1. */
export async function main(run) {
  // Whoever read the output may be gone, as after `| head`; the work goes on to its end.
  for (const stream of [process.stdout, process.stderr]) stream.on('error', () => undefined);
  try {
    await run();
  } catch (error) {
    process.stderr.write(`${error instanceof Stop ? error.message : error.stack}\n`);
    process.exitCode = 1;
  }
}
