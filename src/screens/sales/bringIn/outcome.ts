/** What came of the last file, carried from the way in to the register, which says it once. */

let waiting: string | null = null;

export function leaveOutcome(sentence: string): void {
  waiting = sentence;
}

export function readOutcome(): string | null {
  return waiting;
}

export function forgetOutcome(): void {
  waiting = null;
}
