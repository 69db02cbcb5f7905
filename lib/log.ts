import pino from 'pino';

/** One line of JSON for each event; passwords and cookies never reach it. */
export const log = pino({
  level: process.env.LOG_LEVEL ?? 'info',
  redact: ['password', '*.password', 'headers.cookie', 'headers.authorization'],
});
