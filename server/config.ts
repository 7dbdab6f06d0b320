/** The only reader of the environment. Validated once, frozen, and passed on in `Parts`. */
import { z } from 'zod';

const flag = (fallback: '0' | '1') =>
  z
    .enum(['0', '1'])
    .default(fallback)
    .transform((value) => value === '1');
const port = (fallback: number) => z.coerce.number().int().min(0).max(65_535).default(fallback);
const optionalUrl = z
  .string()
  .optional()
  .transform((value) => value || undefined);

const partNames = ['web', 'ingest', 'jobs'] as const;
export type PartName = (typeof partNames)[number];

const environment = z.object({
  PORT: port(4280),
  MQTT_PORT: port(4283),
  MQTT_TLS_PORT: port(4284),
  MQTT_TLS_CERT: optionalUrl,
  MQTT_TLS_KEY: optionalUrl,
  BIND: z.string().default('127.0.0.1'),
  DATABASE_URL: z.string({
    error: 'DATABASE_URL is not set. Start Saltmark with `npm start`, or set it to a PostgreSQL address.',
  }),
  MQTT_URL: optionalUrl,
  REDIS_URL: optionalUrl,
  SMTP_URL: optionalUrl,
  MAIL_FROM: z.string().default('Saltmark <saltmark@localhost>'),
  SESSION_SECRET: z.string().min(16).default('only-for-tests-and-a-single-process'),
  PUBLIC_URL: optionalUrl,
  TRUST_PROXY: flag('0'),
  METRICS_TOKEN: optionalUrl,
  ROLES: z
    .string()
    .default('web,ingest,jobs')
    .transform((list) => list.split(',').map((name) => name.trim()))
    .pipe(z.array(z.enum(partNames))),
  CLIENT_DIR: z.string().default('client/dist'),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
  CHECK_ANSWERS: flag('0'),
});

export interface Config {
  httpPort: number;
  mqttPort: number;
  mqttTlsPort: number;
  mqttTls: { certFile: string; keyFile: string } | null;
  bind: string;
  databaseUrl: string;
  outsideBrokerUrl: string | undefined;
  redisUrl: string | undefined;
  smtpUrl: string | undefined;
  mailFrom: string;
  sessionSecret: string;
  /** Address people use; links in mail start with it. */
  publicUrl: string;
  isBehindTls: boolean;
  trustProxy: boolean;
  metricsToken: string | undefined;
  parts: readonly PartName[];
  clientDirectory: string;
  logLevel: string;
  /** Parse every answer against its contract before it leaves (tests). */
  checkAnswers: boolean;
}

export function readConfig(source: Record<string, string | undefined> = process.env): Config {
  const parsed = environment.safeParse(source);
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`The environment is not usable. ${lines.join(' ')}`);
  }
  const env = parsed.data;
  const publicUrl = env.PUBLIC_URL ?? `http://${env.BIND}:${env.PORT}`;
  return Object.freeze({
    httpPort: env.PORT,
    mqttPort: env.MQTT_PORT,
    mqttTlsPort: env.MQTT_TLS_PORT,
    mqttTls:
      env.MQTT_TLS_CERT && env.MQTT_TLS_KEY
        ? { certFile: env.MQTT_TLS_CERT, keyFile: env.MQTT_TLS_KEY }
        : null,
    bind: env.BIND,
    databaseUrl: env.DATABASE_URL,
    outsideBrokerUrl: env.MQTT_URL,
    redisUrl: env.REDIS_URL,
    smtpUrl: env.SMTP_URL,
    mailFrom: env.MAIL_FROM,
    sessionSecret: env.SESSION_SECRET,
    publicUrl,
    isBehindTls: publicUrl.startsWith('https:'),
    // Saltmark speaks no TLS itself: behind an https address there is a proxy, and without its word no cookie is set.
    trustProxy: env.TRUST_PROXY || publicUrl.startsWith('https:'),
    metricsToken: env.METRICS_TOKEN,
    parts: env.ROLES,
    clientDirectory: env.CLIENT_DIR,
    logLevel: env.LOG_LEVEL,
    checkAnswers: env.CHECK_ANSWERS,
  });
}
