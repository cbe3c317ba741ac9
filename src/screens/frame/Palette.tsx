/** "Find or do": every place, class and act by name, chosen by typing a few letters and Enter. */
import { type KeyboardEvent, useEffect, useState } from "react";
import { KeyCap } from "../parts/index.ts";
import { PLACES, START } from "../routes.ts";
import { useTheme } from "../theme/useTheme.ts";
import type { Act } from "../workbench/acts.ts";
import { useWorkbench } from "../workbench/workbench.ts";
import css from "./Frame.module.css";
import { goTo } from "./useRoute.ts";

/** Acts whose words begin with every word typed, in any order. */
export function findActs(acts: readonly Act[], typed: string): readonly Act[] {
  const wanted = typed.toLowerCase().split(/\s+/).filter(Boolean);
  return acts.filter((act) => {
    const words = act.label.toLowerCase().split(/[\s:]+/);
    return wanted.every((one) => words.some((word) => word.startsWith(one)));
  });
}

function useFrameActs(): readonly Act[] {
  const { classes, classId, canUndo, canRedo, undo, redo, openClass } = useWorkbench();
  const { theme, switchTheme } = useTheme();
  const places = classId === null ? [] : PLACES;
  return [
    ...places.map((place) => ({ label: `Go to ${place.label}`, run: () => goTo(place.path) })),
    ...classes
      .filter((one) => one.id !== classId)
      .map((one) => ({ label: `Open class: ${one.name}`, run: () => void openClass(one.id) })),
    ...(canUndo ? [{ label: "Undo the last change", keys: "Ctrl Z", run: undo }] : []),
    ...(canRedo ? [{ label: "Redo the change", keys: "Ctrl Shift Z", run: redo }] : []),
    { label: theme === "light" ? "Switch to dark paper" : "Switch to light paper", run: switchTheme },
    { label: "Start another class", run: () => goTo(START.path) },
  ];
}

export function Palette({ placeActs, onClose }: { placeActs: readonly Act[]; onClose: () => void }) {
  const [typed, setTyped] = useState("");
  const [at, setAt] = useState(0);
  const found = findActs([...placeActs, ...useFrameActs()], typed);
  const chosen = Math.min(at, found.length - 1);
  const [before] = useState(() => document.activeElement);
  useEffect(() => () => (before as HTMLElement | null)?.focus?.(), [before]);
  const run = (act: Act | undefined): void => {
    if (act === undefined) return;
    onClose();
    act.run();
  };
  const press = (event: KeyboardEvent): void => {
    if (event.key === "Escape") onClose();
    else if (event.key === "ArrowDown") setAt(Math.min(chosen + 1, found.length - 1));
    else if (event.key === "ArrowUp") setAt(Math.max(chosen - 1, 0));
    else if (event.key === "Enter") run(found[chosen]);
    else return;
    event.preventDefault();
  };
  return (
    <div className={css.palette} onPointerDown={(event) => event.target === event.currentTarget && onClose()}>
      <div className={css.paletteBox} role="dialog" aria-label="Find or do">
        <input
          ref={(input) => input?.focus()}
          role="combobox"
          aria-expanded="true"
          aria-controls="found"
          aria-activedescendant={found.length > 0 ? `found-${chosen}` : undefined}
          aria-label="Find or do"
          placeholder="Find a place or an act"
          value={typed}
          onChange={(event) => {
            setTyped(event.target.value);
            setAt(0);
          }}
          onKeyDown={press}
        />
        <div className={css.found} id="found" role="listbox" aria-label="Found">
          {found.map((act, index) => (
            // biome-ignore lint/a11y/useKeyWithClickEvents lint/a11y/useFocusableInteractive: the field above holds the focus and its keys
            <div
              key={act.label}
              id={`found-${index}`}
              role="option"
              aria-selected={index === chosen}
              onClick={() => run(act)}
            >
              <span>{act.label}</span>
              {act.keys === undefined ? null : <KeyCap>{act.keys}</KeyCap>}
            </div>
          ))}
          {found.length === 0 ? <p className={css.none}>Nothing of that name here.</p> : null}
        </div>
      </div>
    </div>
  );
}
