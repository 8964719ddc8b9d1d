/** Exit codes: a contract with scripts. */
export const EXIT = {
  solved: 0,
  /** the case or the command is wrong */
  wrong: 2,
  /** it could not be solved; what was reached is kept */
  unsolved: 3,
  /** interrupted; what was reached is kept */
  interrupted: 130,
} as const;
