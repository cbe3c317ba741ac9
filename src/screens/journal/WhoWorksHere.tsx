/** The name that stands in the journal and on drafts, asked once. */
import { useCallback, useState } from "react";
import type { Client } from "../../contract/client.ts";
import type { Settings } from "../../contract/requests.ts";
import { Button, ErrorNote, TextLink } from "../parts/index.ts";
import { useRead, useTask } from "../workbench/useTask.ts";
import css from "./JournalPlace.module.css";

const FIELDS: readonly (readonly [keyof Settings, string])[] = [
  ["person", "Name"],
  ["credentials", "Credentials"],
  ["practice", "Practice"],
  ["practiceLine", "Practice, second line"],
];

export function WhoWorksHere({ client }: { readonly client: Client }) {
  const [stamp, setStamp] = useState(0);
  const [draft, setDraft] = useState<Settings | null>(null);
  const saving = useTask();
  // biome-ignore lint/correctness/useExhaustiveDependencies: `stamp` asks again after a change
  const ask = useCallback(() => client.ask("readSettings", {}), [client, stamp]);
  const { value } = useRead(ask);
  if (value === null) return null;
  if (draft === null) {
    return (
      <p className={css.who}>
        {value.person === ""
          ? "Nobody has given a name yet: entries say “not stated”."
          : `Entries are signed ${value.person}.`}{" "}
        <TextLink onPress={() => setDraft(value)}>{value.person === "" ? "Say who works here" : "Change"}</TextLink>
      </p>
    );
  }
  const save = async () => {
    const done = await saving.run(() => client.ask("changeSettings", draft));
    if (done === null) return;
    setDraft(null);
    setStamp((now) => now + 1);
  };
  return (
    <form
      className={css.settings}
      onSubmit={(event) => {
        event.preventDefault();
        void save();
      }}
    >
      {FIELDS.map(([key, label]) => (
        <label key={key}>
          {label}
          <input value={draft[key]} onChange={(event) => setDraft({ ...draft, [key]: event.target.value })} />
        </label>
      ))}
      <Button type="submit" primary>
        Keep
      </Button>
      <Button onClick={() => setDraft(null)}>Cancel</Button>
      {saving.error === null ? null : <ErrorNote error={saving.error} />}
    </form>
  );
}
