import { z } from 'zod';

const Environment = z.object({
  APP_DATABASE_URL: z.url({
    protocol: /^postgres(ql)?$/,
    error: 'the address of PostgreSQL, with the role "app"',
  }),
  JWT_SECRET: z.string().min(32, { error: 'at least 32 characters' }),
  HOST: z.string().min(1).default('127.0.0.1'),
  PORT: z.coerce.number().int().min(1).max(65535).default(3000),
  INCHWATER_DATA: z.string().min(1).default('.data'),
  INCHWATER_DIST: z.string().min(1).default('./dist'),
  LOG_LEVEL: z.enum(['trace', 'debug', 'info', 'warn', 'error', 'fatal', 'silent']).default('info'),
});
export type Config = z.infer<typeof Environment>;

/** What the environment says. @throws Error that names what is missing; it never shows a value */
export function readConfig(environment: NodeJS.ProcessEnv): Config {
  const parsed = Environment.safeParse(environment);
  if (parsed.success) return parsed.data;
  const wrong = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
  throw new Error(`The server cannot start.\n${wrong.join('\n')}`);
}
