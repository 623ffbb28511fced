import { type Config, readConfig } from './config.ts';

/** Runs a command that takes one file; says what came of it, and ends with 1 where it failed. */
export async function runCommand(
  name: string,
  run: (file: string, config: Config) => Promise<string>,
): Promise<void> {
  try {
    const [file, ...more] = process.argv.slice(2);
    if (file === undefined || more.length > 0) throw new Error(`Usage: npm run ${name} -- FILE`);
    process.stdout.write(`${await run(file, readConfig(process.env))}\n`);
  } catch (error) {
    process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    process.exitCode = 1;
  }
}
