const DAY = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
  timeZone: 'UTC',
});
const MINUTE = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
  hour: '2-digit',
  minute: '2-digit',
  timeZone: 'UTC',
});

/** "14 Oct 2026" */
export function day(date: Date): string {
  return DAY.format(date);
}

/** "14 Oct 2026, 09:40 UTC": the server's time, the same for whoever reads it. */
export function minute(date: Date): string {
  return `${MINUTE.format(date)} UTC`;
}
