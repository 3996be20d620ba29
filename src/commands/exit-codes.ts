/** What the program's exit code says, as documented. */
export const EXIT = {
  done: 0,
  /** `--expect` not met */
  unexpected: 1,
  /** usage errors included */
  wrongInput: 2,
  /** a simulation could not be completed */
  failed: 3,
  /** a file could not be read or written */
  file: 4,
  /** internal fault */
  fault: 70,
  interrupted: 130,
  terminated: 143,
} as const;
