import { writeSync } from 'node:fs';
import process from 'node:process';
import { readCommandLine, usage, UsageError } from './command-line';
import { createProgress } from './progress';
import { run } from './run';

/** Written at once: a pipe that is read slowly holds the program back, and nothing is lost when it ends. */
function write(text: string): void {
  const bytes = Buffer.from(text);
  for (let at = 0; at < bytes.length; ) {
    try {
      at += writeSync(1, bytes, at);
    } catch (error) {
      const code = (error as NodeJS.ErrnoException).code;
      // Whoever read it has gone away.
      if (code === 'EPIPE') process.exit(0);
      if (code !== 'EAGAIN') throw error;
      Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, 5);
    }
  }
}

async function main(): Promise<number> {
  try {
    const command = readCommandLine(process.argv.slice(2));
    if (command !== 'help') return await run(command, write, createProgress(process.stderr));
    write(`${usage}\n`);
    return 0;
  } catch (error) {
    if (!(error instanceof UsageError)) throw error;
    process.stderr.write(`${error.message}\n\n${usage}\n`);
    return 1;
  }
}

process.exitCode = await main();
