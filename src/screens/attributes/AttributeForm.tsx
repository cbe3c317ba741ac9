/** Adds or changes one attribute in place; what is wrong stands under its field. */
import { useState } from "react";
import type { Attribute, AttributeKind } from "../../domain/attribute.ts";
import { Button, Field, SectionHeading } from "../parts/index.ts";
import css from "./AttributesPlace.module.css";
import { type AttributeDraft, attributeOf, draftOf, faultsOf, NEW_DRAFT } from "./attributeDraft.ts";

const KINDS: readonly { readonly value: AttributeKind; readonly label: string }[] = [
  { value: "number", label: "a number with a unit" },
  { value: "choice", label: "a choice from a list" },
  { value: "yesNo", label: "yes or no" },
  { value: "built", label: "a built day, read as age at sale" },
];

export interface AttributeFormProps {
  /** Null: a new one. */
  readonly attribute: Attribute | null;
  readonly all: readonly Attribute[];
  readonly isBusy: boolean;
  readonly onKeep: (attribute: Attribute) => void;
  readonly onCancel: () => void;
}

export function AttributeForm({ attribute, all, isBusy, onKeep, onCancel }: AttributeFormProps) {
  const [draft, setDraft] = useState<AttributeDraft>(() => (attribute === null ? NEW_DRAFT : draftOf(attribute)));
  const [isTold, setTold] = useState(false);
  const others = all.filter((one) => one !== attribute);
  const found = faultsOf(
    draft,
    others.map(({ label }) => label),
  );
  const faults = isTold ? found : {};
  const change = (part: Partial<AttributeDraft>): void => setDraft((now) => ({ ...now, ...part }));
  const isMeasured = draft.kind === "number" || draft.kind === "built";
  const text = (name: keyof AttributeDraft, label: string, unit: string | null = null) => (
    <Field label={label} unit={unit} error={faults[name] ?? null}>
      {(wiring) => (
        <input
          {...wiring}
          value={draft[name]}
          maxLength={80}
          onChange={(event) => change({ [name]: event.target.value })}
        />
      )}
    </Field>
  );
  return (
    <form
      aria-label={attribute === null ? "New attribute" : `Change ${attribute.label}`}
      onSubmit={(event) => {
        event.preventDefault();
        setTold(true);
        const keys = all.map(({ key }) => key);
        if (Object.keys(found).length === 0) onKeep(attributeOf(draft, attribute, keys));
      }}
      onKeyDown={(event) => {
        if (event.key === "Escape") onCancel();
      }}
    >
      <SectionHeading>{attribute === null ? "New attribute" : `Change ${attribute.label}`}</SectionHeading>
      <div className={css.form}>
        {text("label", "Name")}
        <Field label="What it is" note={attribute === null ? undefined : "fixed once made"}>
          {(wiring) => (
            <select
              {...wiring}
              value={draft.kind}
              disabled={attribute !== null}
              onChange={(event) => change({ kind: event.target.value as AttributeKind })}
            >
              {KINDS.map(({ value, label }) => (
                <option key={value} value={value}>
                  {label}
                </option>
              ))}
            </select>
          )}
        </Field>
        {draft.kind === "number" ? text("unit", "Unit") : null}
        {isMeasured ? (
          <>
            {text("step", "One more is, in sentences and ledgers", unitOf(draft))}
            {text("lowest", "Lowest allowed", unitOf(draft))}
            {text("highest", "Highest allowed", unitOf(draft))}
            {text("decimals", "Decimals shown")}
          </>
        ) : null}
        {draft.kind === "choice" ? null : (
          <Field label="The price is expected to">
            {(wiring) => (
              <select
                {...wiring}
                value={draft.expectedDirection}
                onChange={(event) =>
                  change({ expectedDirection: event.target.value as AttributeDraft["expectedDirection"] })
                }
              >
                <option value="">go either way</option>
                <option value="up">{draft.kind === "yesNo" ? "be higher with it" : "rise with it"}</option>
                <option value="down">{draft.kind === "yesNo" ? "be lower with it" : "fall with it"}</option>
              </select>
            )}
          </Field>
        )}
        {draft.kind === "choice" ? (
          <div className={css.wide}>
            <Field label="Levels, one a line, in their order" error={faults.levels ?? null}>
              {(wiring) => (
                <textarea
                  {...wiring}
                  rows={Math.min(10, Math.max(3, draft.levels.split("\n").length))}
                  value={draft.levels}
                  placeholder="left empty, they come with the first file"
                  onChange={(event) => change({ levels: event.target.value })}
                />
              )}
            </Field>
          </div>
        ) : null}
        <div className={css.wide}>
          <Field label="Notes: how it is read off an item">
            {(wiring) => (
              <textarea
                {...wiring}
                rows={2}
                maxLength={2000}
                value={draft.notes}
                onChange={(event) => change({ notes: event.target.value })}
              />
            )}
          </Field>
        </div>
      </div>
      <div className={css.acts}>
        <Button type="submit" primary disabled={isBusy}>
          {attribute === null ? "Add attribute" : "Keep the change"}
        </Button>
        <Button onClick={onCancel}>Cancel</Button>
      </div>
    </form>
  );
}

function unitOf(draft: AttributeDraft): string | null {
  return draft.kind === "built" ? "years" : draft.unit.trim() === "" ? null : draft.unit;
}
