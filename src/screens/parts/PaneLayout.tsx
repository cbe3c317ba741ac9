/** Cause left, effect right, and a divider between them that is dragged or moved by arrow keys; its place is remembered. */
import { type CSSProperties, type KeyboardEvent, type PointerEvent, type ReactNode, useState } from "react";
import css from "./PaneLayout.module.css";

export interface PaneLayoutProps {
  /** The place it is remembered for. */
  readonly name: string;
  readonly left: ReactNode;
  readonly right: ReactNode;
  /** Width of the left pane in pixels until somebody drags it. */
  readonly leftWidth?: number;
  /** Instead of leftWidth: the right pane has this width, and the left the wide share, in a narrow window too. */
  readonly rightWidth?: number;
  readonly leftLabel?: string;
  readonly rightLabel?: string;
}

const NARROWEST = 280;
const KEY_STEP = 16;

function widest(): number {
  return Math.max(NARROWEST, window.innerWidth - NARROWEST);
}

function remembered(name: string): number | null {
  if (typeof localStorage === "undefined") return null;
  const width = Number(localStorage.getItem(`lotwright.pane.${name}`));
  return width >= NARROWEST ? width : null;
}

export function PaneLayout(props: PaneLayoutProps) {
  const { name, left, right, leftWidth = 468, rightWidth, leftLabel = "Evidence", rightLabel = "Outcome" } = props;
  const [chosen, setChosen] = useState<number | null>(() => remembered(name));
  const wanted =
    chosen !== null || rightWidth === undefined ? `${chosen ?? leftWidth}px` : `calc(100% - ${rightWidth}px)`;
  const choose = (next: number): void => {
    const kept = Math.round(Math.min(widest(), Math.max(NARROWEST, next)));
    setChosen(kept);
    localStorage.setItem(`lotwright.pane.${name}`, String(kept));
  };
  const drag = (event: PointerEvent<HTMLDivElement>): void => {
    if (!event.currentTarget.hasPointerCapture(event.pointerId)) return;
    choose(event.clientX - event.currentTarget.parentElement!.getBoundingClientRect().left);
  };
  const press = (event: KeyboardEvent<HTMLDivElement>): void => {
    const step = event.key === "ArrowLeft" ? -KEY_STEP : event.key === "ArrowRight" ? KEY_STEP : 0;
    if (step === 0) return;
    event.preventDefault();
    choose(event.currentTarget.offsetLeft + event.currentTarget.offsetWidth / 2 + step);
  };
  return (
    <div
      className={rightWidth === undefined ? css.panes : `${css.panes} ${css.wideLeft}`}
      style={{ "--wanted": wanted } as CSSProperties}
    >
      <section className={css.left} aria-label={leftLabel}>
        {left}
      </section>
      {/* biome-ignore lint/a11y/useSemanticElements: a rule that can be moved has no element of its own */}
      <div
        className={css.divider}
        role="separator"
        aria-orientation="vertical"
        aria-label="Width of the left pane"
        aria-valuenow={chosen ?? (rightWidth === undefined ? leftWidth : widest() + NARROWEST - rightWidth)}
        aria-valuemin={NARROWEST}
        tabIndex={0}
        onPointerDown={(event) => event.currentTarget.setPointerCapture(event.pointerId)}
        onPointerMove={drag}
        onKeyDown={press}
      />
      <section className={css.right} aria-label={rightLabel}>
        {right}
      </section>
    </div>
  );
}
