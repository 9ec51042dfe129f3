// Exit codes, one meaning each.

export const exitCodes = {
  done: 0,
  inputWrong: 1,
  usage: 2,
  /** Overall verdict is not `meets`; only with --fail-on-verdict. */
  verdict: 3,
  /** Disk or network. */
  outside: 6,
  ourBug: 70,
} as const

export type ExitCode = (typeof exitCodes)[keyof typeof exitCodes]
