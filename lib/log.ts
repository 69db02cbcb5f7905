import pino from 'pino';

const LEVELS = [...Object.keys(pino.levels.values), 'silent'];
const SECRETS = ['password', 'token', 'secret', 'cookie', 'authorization'];

/**
 * One line of JSON for each event; passwords, tokens and cookies never reach it. LOG_LEVEL is read here and not with
 * the other variables, because the log must also work where one of those is wrong.
 */
export const log = pino({
  level: LEVELS.find((name) => name === process.env.LOG_LEVEL) ?? 'info',
  redact: SECRETS.flatMap((name) => [name, `*.${name}`, `*.*.${name}`]),
});
