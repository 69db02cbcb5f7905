export interface Caution {
  /** Stable key, kept with the acknowledgement. */
  readonly key: string;
  readonly text: string;
}

/**
 * The usual cautions of work at a machine, in the order in which they are needed. They stand on every sheet and are
 * acknowledged before as-left values can be entered. Common practice; the site's own rules come first.
 */
export const CAUTIONS: readonly Caution[] = [
  {
    key: 'competent-person',
    text: 'Only a person who is trained and authorised for this machine enters these values.',
  },
  {
    key: 'site-rules-first',
    text: 'The machine’s own instructions, the site’s permits and the local codes come before this sheet; where they differ, stop and ask.',
  },
  {
    key: 'lock-out',
    text: 'Lock out and prove dead before touching wiring; adjust live only as the site’s procedure allows.',
  },
  {
    key: 'safety-functions',
    text: 'Leave safety functions, interlocks and trips as they are; this sheet gives no leave to change them.',
  },
  {
    key: 'keep-clear',
    text: 'Keep people and tools clear of moving and hot parts, and tell those nearby before the first run.',
  },
  {
    key: 'emergency-stop',
    text: 'Have a tested emergency stop within reach, and block or brake loads that could drop.',
  },
  {
    key: 'limits-set',
    text: 'Set the limits of travel, speed, force and temperature before enabling, and prove the direction by a small move.',
  },
  {
    key: 'as-found-first',
    text: 'Write the as-found values down before changing anything, and read every new value back from the device.',
  },
  {
    key: 'start-small',
    text: 'Make the first run at a reduced set-point, away from the end stops, and change one thing at a time.',
  },
  {
    key: 'watch-and-go-back',
    text: 'Watch for oscillation, a wrong direction, noise, heat or smell; at the first sign stop and put the as-found values back.',
  },
  {
    key: 'linear-model',
    text: 'Fettle computes with a linear model: wear, load, temperature and supply move the real machine away from it.',
  },
];
