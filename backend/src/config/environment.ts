import { z } from 'zod';

const port = z.coerce.number().int().min(0).max(65_535);
const secret = z.string().min(32, 'at least 32 characters').optional();

/** Everything the environment may say, in one place. Nothing else reads `process.env`. */
export const environmentSchema = z.object({
  NODE_ENV: z.enum(['development', 'production', 'test']).default('development'),
  PORT: port.default(3000),
  HOST: z.string().min(1).default('127.0.0.1'),
  PUBLIC_URL: z.url().optional(),
  DATABASE_FILE: z.string().min(1).default('var/hubtack.sqlite'),
  UPLOADS_DIR: z.string().min(1).default('var/uploads'),
  /** 10110 is the port that IANA registers for NMEA 0183; 0 switches the listener off. */
  NMEA_TCP_PORT: port.default(10_110),
  SESSION_SECRET: secret,
  SECRETS_KEY: secret,
  SMTP_URL: z.url().optional(),
  MAIL_FROM: z.string().min(3).default('Hubtack <hubtack@localhost>'),
  CASTER_PRIVATE_ADDRESSES: z.enum(['deny', 'allow']).default('deny'),
  RAW_EPOCH_DAYS: z.coerce.number().int().min(1).max(100_000).default(14),
  METRICS_TOKEN: z.string().min(16, 'at least 16 characters').optional(),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info'),
  /** Where the demo's own caster listens; read when the demo firm is made. */
  DEMO_CASTER_PORT: port.default(2101),
  TILE_URL: z.url().optional(),
  DEMO: z
    .enum(['off', 'on'])
    .default('off')
    .transform((value) => value === 'on'),
});
export type Environment = z.infer<typeof environmentSchema>;

export class EnvironmentError extends Error {}

/** Reads the environment; throws one EnvironmentError that lists every problem together. */
export function parseEnvironment(source: Record<string, string | undefined>): Environment {
  const present = Object.fromEntries(Object.entries(source).filter(([, value]) => value !== ''));
  const result = environmentSchema.safeParse(present);
  if (result.success) return result.data;
  const problems = result.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
  throw new EnvironmentError(`The environment has problems:\n${problems.join('\n')}`);
}
