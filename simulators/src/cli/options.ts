import { parseArgs, type ParseArgsConfig } from 'node:util';
import type { z } from 'zod';

/** Reads command-line options; a wrong one is said in plain words and ends the command with status 2. */
export function readOptions<T extends z.ZodType>(
  usage: string,
  options: NonNullable<ParseArgsConfig['options']>,
  schema: T,
): z.infer<T> {
  const stop = (problem: string): never => {
    console.error(`${problem}\n\n${usage}`);
    process.exit(2);
  };
  try {
    const { values, positionals } = parseArgs({ options, allowPositionals: true });
    const result = schema.safeParse({ ...values, positionals });
    if (result.success) return result.data;
    const problems = result.error.issues.map((issue) => `--${issue.path.join('.')}: ${issue.message}`);
    return stop(problems.join('\n'));
  } catch (error) {
    return stop((error as Error).message);
  }
}
