/**
 * Checked by every entry before the database driver is loaded: on an older Node that driver ends the process without a word.
 * Nothing but plain language features may stand here, and entries import the rest only after this has passed.
 */

export const OLDEST_NODE = { major: 22, minor: 12 } as const;

/** Null when this Node will do, else a sentence that says what to do. */
export function nodeRefusal(version: string): string | null {
  const [major = 0, minor = 0] = version.replace(/^v/, "").split(".").map(Number);
  if (major > OLDEST_NODE.major || (major === OLDEST_NODE.major && minor >= OLDEST_NODE.minor)) return null;
  return (
    `Lotwright needs Node ${OLDEST_NODE.major}.${OLDEST_NODE.minor} or later; this is ${version}. ` +
    "Start it with npm (npm start, or npm run -s lotwright -- help), which brings its own Node."
  );
}

/** Ends the process with exit code 2 and a sentence when this Node is too old. */
export function requireNode(): void {
  const refusal = nodeRefusal(process.version);
  if (refusal === null) return;
  process.stderr.write(`${refusal}\n`);
  process.exit(2);
}
