import { z } from 'zod';

const flag = z.enum(['0', '1']).transform((value) => value === '1');

const limit = (usual: number, most: number) => z.coerce.number().int().min(1).max(most).default(usual);

const schema = z.object({
  HOST: z.string().default('127.0.0.1'),
  PORT: z.coerce.number().int().min(1).max(65535).default(4321),
  DATABASE_URL: z.url(),
  AUTH_SECRET: z.string().min(32),
  PUBLIC_URL: z.url(),
  DEMO: flag.default(false),
  SMTP_URL: z.url(),
  MAIL_FROM: z.string().min(3),
  /** Set only beside the local mail fake: where its messages can be read. */
  MAIL_FAKE_URL: z.url().optional(),
  S3_ENDPOINT: z.url(),
  S3_REGION: z.string().min(1),
  S3_BUCKET: z.string().min(3),
  S3_ACCESS_KEY_ID: z.string().min(1),
  S3_SECRET_ACCESS_KEY: z.string().min(1),
  /** What one import may hold. */
  IMPORT_FILE_MB: limit(512, 100_000),
  IMPORT_TEXT_MB: limit(2_048, 1_000_000),
  IMPORT_TIE_ROWS: limit(10_000_000, 100_000_000),
  IMPORT_MEMBER_ROWS: limit(1_000_000, 10_000_000),
  IMPORT_COLUMNS: limit(200, 10_000),
  LOG_LEVEL: z.enum(['trace', 'debug', 'info', 'warn', 'error', 'silent']).default('info'),
});

export type Config = z.infer<typeof schema>;

let cached: Config | undefined;

/**
 * The configuration, read from the environment once and shared by the web process and the worker.
 * @throws Error naming every variable that is missing or malformed, never its value.
 */
export function config(): Config {
  if (cached) return cached;
  const parsed = schema.safeParse(process.env);
  if (!parsed.success) {
    const names = [...new Set(parsed.error.issues.map((issue) => issue.path.join('.')))];
    throw new Error(
      `Configuration is missing or malformed: ${names.join(', ')}. See README.md, "Variables".`,
    );
  }
  cached = parsed.data;
  return cached;
}
