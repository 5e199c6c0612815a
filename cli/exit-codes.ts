/** Exit codes of the program. */
export const exitCodes = {
  done: 0,
  regression: 1,
  badInput: 2,
  cellsFailed: 3,
  interrupted: 130,
} as const;

export type ExitCode = (typeof exitCodes)[keyof typeof exitCodes];
