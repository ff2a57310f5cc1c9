/** How the program ends. Codes as the contract has them. */
export const EXIT = {
  pass: 0,
  /** A check is over its limit or could not be computed; with `--strict` also: not assessed. */
  over: 1,
  invalidFile: 2,
  usage: 3,
  interrupted: 130,
} as const;

export type ExitCode = (typeof EXIT)[keyof typeof EXIT];

/** Something the user asked for that cannot be done; its message is one line and names what to change. */
export class UsageError extends Error {
  override readonly name = 'UsageError';
}
