import { parseArgs, type ParseArgsConfig } from 'node:util';
import type { z } from 'zod';

/** Says what is wrong with how a command was called, in plain words, and ends it with status 2. */
export function stopWith(problem: string, usage: string): never {
  console.error(`${problem}\n\n${usage}`);
  process.exit(2);
}

const nameOf = (path: readonly PropertyKey[]): string =>
  path[0] === 'positionals' ? '' : `--${path.join('.')}: `;

/** Reads command-line options; `--help` shows the usage. Words without an option are refused unless the schema names `positionals`. */
export function readOptions<T extends z.ZodObject>(
  usage: string,
  options: NonNullable<ParseArgsConfig['options']>,
  schema: T,
): z.infer<T> {
  const parse = () =>
    parseArgs({
      options: { ...options, help: { type: 'boolean' } },
      allowPositionals: 'positionals' in schema.shape,
    });
  let given: ReturnType<typeof parse>;
  try {
    given = parse();
  } catch (error) {
    return stopWith((error as Error).message, usage);
  }
  if (given.values.help) {
    console.log(usage);
    process.exit(0);
  }
  const result = schema.safeParse({ ...given.values, positionals: given.positionals });
  if (result.success) return result.data;
  return stopWith(
    result.error.issues.map(({ path, message }) => `${nameOf(path)}${message}`).join('\n'),
    usage,
  );
}
