/** Exit codes of every command (the numbers of BSD `sysexits.h`). */
export const exitCodes = {
  done: 0,
  /** A check failed, or nothing fits. */
  failed: 1,
  wrongUse: 64,
  badData: 65,
  noInput: 66,
  ownFault: 70,
  cannotCreate: 73,
  inputOutput: 74,
  badSettings: 78,
} as const;

export type ExitCode = (typeof exitCodes)[keyof typeof exitCodes];
