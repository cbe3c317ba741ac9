/** One of a few, side by side; arrow keys move the choice. */
import type { KeyboardEvent } from "react";
import css from "./parts.module.css";

export interface SegmentedChoiceProps<Value extends string | number | boolean> {
  readonly label: string;
  readonly options: readonly { value: Value; label: string; title?: string }[];
  readonly value: Value;
  readonly onChoose: (value: Value) => void;
}

const STEP: Readonly<Record<string, number>> = { ArrowRight: 1, ArrowDown: 1, ArrowLeft: -1, ArrowUp: -1 };

export function SegmentedChoice<Value extends string | number | boolean>(props: SegmentedChoiceProps<Value>) {
  const { label, options, value, onChoose } = props;
  const move = (event: KeyboardEvent<HTMLDivElement>): void => {
    const step = STEP[event.key];
    if (step === undefined) return;
    event.preventDefault();
    const at = options.findIndex((option) => option.value === value);
    const next = (at + step + options.length) % options.length;
    onChoose(options[next]!.value);
    (event.currentTarget.children[next] as HTMLElement | undefined)?.focus();
  };
  return (
    <div className={css.segments} role="radiogroup" aria-label={label} onKeyDown={move}>
      {options.map((option) => (
        // biome-ignore lint/a11y/useSemanticElements: a button row that reads as radio buttons
        <button
          key={String(option.value)}
          type="button"
          role="radio"
          aria-checked={option.value === value}
          tabIndex={option.value === value ? 0 : -1}
          title={option.title}
          onClick={() => onChoose(option.value)}
        >
          {option.label}
        </button>
      ))}
    </div>
  );
}
