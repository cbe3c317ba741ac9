/** A labelled control on raised paper: label above, unit and note beside, the fault below it in words. */
import { type ReactNode, useId } from "react";
import css from "./parts.module.css";

export interface FieldProps {
  readonly label: string;
  readonly unit?: string | null;
  readonly note?: ReactNode;
  readonly error?: string | null;
  /** Draws the control; give it `id` and `aria-describedby` as passed. */
  readonly children: (wiring: { id: string; "aria-describedby": string; "aria-invalid": boolean }) => ReactNode;
}

export function Field({ label, unit = null, note, error = null, children }: FieldProps) {
  const id = useId();
  const faultId = `${id}-fault`;
  return (
    <div className={css.field}>
      <label htmlFor={id}>{label}</label>
      <div className={css.control}>
        {children({ id, "aria-describedby": faultId, "aria-invalid": error !== null })}
        {unit === null ? null : <span className={css.unit}>{unit}</span>}
        {note === undefined ? null : <span className={css.fieldNote}>{note}</span>}
      </div>
      <div id={faultId} className={css.fieldError} aria-live="polite">
        {error}
      </div>
    </div>
  );
}
