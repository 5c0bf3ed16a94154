/** What the command's exit code says (design 4). */
export const exitCode = { done: 0, wrong: 2, unmet: 3, failed: 4, interrupted: 130 } as const
