/** Exit codes of SHEET.md. */
export const exitCodes = {
  done: 0,
  fault: 1,
  inputUnusable: 2,
  someRefused: 3,
} as const;

export type ExitCode = (typeof exitCodes)[keyof typeof exitCodes];
