/** A filter in words that opens in place: "Through all, asking too". Escape, or a press elsewhere, closes it. */
import { type ReactNode, useEffect, useId, useRef, useState } from "react";
import css from "./RegisterBar.module.css";

export interface FilterChoiceProps {
  readonly label: string;
  /** What is set now. */
  readonly words: string;
  readonly isSet: boolean;
  /** At the foot of the register the panel opens upwards. */
  readonly opensUp?: boolean;
  readonly children: ReactNode;
}

export function FilterChoice({ label, words, isSet, opensUp = false, children }: FilterChoiceProps) {
  const [isOpen, setOpen] = useState(false);
  const [opensBack, setOpensBack] = useState(false);
  const whole = useRef<HTMLDivElement>(null);
  const opener = useRef<HTMLButtonElement>(null);
  const id = useId();
  useEffect(() => {
    if (!isOpen) return;
    const press = (event: PointerEvent): void => {
      if (whole.current?.contains(event.target as Node) === false) setOpen(false);
    };
    window.addEventListener("pointerdown", press);
    return () => window.removeEventListener("pointerdown", press);
  }, [isOpen]);
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: only listens for Escape from the controls inside
    <div
      ref={whole}
      className={css.choice}
      onKeyDown={(event) => {
        if (event.key !== "Escape" || !isOpen) return;
        event.stopPropagation();
        setOpen(false);
        opener.current?.focus();
      }}
    >
      <button
        ref={opener}
        type="button"
        aria-expanded={isOpen}
        aria-controls={isOpen ? id : undefined}
        onClick={(event) => {
          setOpensBack(isNearEdge(event.currentTarget));
          setOpen(!isOpen);
        }}
      >
        {label} <b className={isSet ? css.set : undefined}>{words}</b>
      </button>
      {isOpen ? (
        <fieldset id={id} className={[css.panel, opensUp ? css.up : "", opensBack ? css.back : ""].join(" ")}>
          <legend className="vh">{label}</legend>
          {children}
        </fieldset>
      ) : null}
    </div>
  );
}

/** The widest panel, in pixels. */
const WIDEST = 510;

/** True where a panel would run out of its pane to the right, and has the room to the left. */
function isNearEdge(opener: HTMLElement): boolean {
  const own = opener.getBoundingClientRect();
  const pane = opener.closest("section")?.getBoundingClientRect();
  return pane !== undefined && own.left + WIDEST > pane.right && own.right - WIDEST > pane.left;
}
