/** Who works here: name, credentials and practice, as they stand on sheets and in the journal. */
import type { Database } from "better-sqlite3";

export interface StoredSettings {
  readonly person: string;
  readonly credentials: string;
  readonly practice: string;
  readonly practiceLine: string;
}

const NAMES = ["person", "credentials", "practice", "practiceLine"] as const;

export type SettingsTable = ReturnType<typeof settingsOf>;

export function settingsOf(db: Database) {
  const select = db.prepare<[string], string>("SELECT value FROM settings WHERE name = ?").pluck();
  const upsert = db.prepare(
    "INSERT INTO settings (name, value) VALUES (?, ?) ON CONFLICT (name) DO UPDATE SET value = excluded.value",
  );
  return {
    /** Empty text for what was never set. */
    read(): StoredSettings {
      const [person, credentials, practice, practiceLine] = NAMES.map((name) => select.get(name) ?? "");
      return { person: person!, credentials: credentials!, practice: practice!, practiceLine: practiceLine! };
    },
    write(settings: StoredSettings): void {
      for (const name of NAMES) upsert.run(name, settings[name]);
    },
  };
}
