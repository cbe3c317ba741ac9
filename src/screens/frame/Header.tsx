/** Class switcher, the places with their counts, the note that demo data is invented, theme, and "Find or do". */

import { formatNumber } from "../../domain/format.ts";
import { KeyCap } from "../parts/index.ts";
import { PLACES, type Place, START } from "../routes.ts";
import { useTheme } from "../theme/useTheme.ts";
import { useWorkbench } from "../workbench/workbench.ts";
import css from "./Frame.module.css";
import { goTo, hrefOf } from "./useRoute.ts";

const NEW_CLASS = "new";

export function Header({ place, onFind }: { place: Place; onFind: () => void }) {
  const { classId, assetClass } = useWorkbench();
  return (
    <header className={css.head}>
      <ClassSwitcher />
      <nav aria-label="Places">{classId === null ? null : <PlaceLinks current={place} />}</nav>
      <div className={css.end}>
        {assetClass?.invented ? <span className={css.invented}>Demo class, invented data</span> : null}
        <ThemeSwitch />
        <button type="button" onClick={onFind}>
          Find or do <KeyCap>Ctrl K</KeyCap>
        </button>
      </div>
    </header>
  );
}

function ClassSwitcher() {
  const { classes, classId, openClass } = useWorkbench();
  if (classId === null) return <div className={`${css.class} ${css.name}`}>Lotwright</div>;
  return (
    <div className={css.class}>
      <select
        aria-label="Asset class"
        value={String(classId)}
        onChange={(event) => {
          if (event.target.value === NEW_CLASS) goTo(START.path);
          else void openClass(Number(event.target.value));
        }}
      >
        {classes.map((one) => (
          <option key={one.id} value={String(one.id)}>
            {one.name}
          </option>
        ))}
        <option value={NEW_CLASS}>Start another class …</option>
      </select>
      <svg width="9" height="6" aria-hidden="true">
        <path d="M.5.5 4.5 5 8.5.5" className="s-ink f-none" strokeWidth="1.3" />
      </svg>
    </div>
  );
}

function PlaceLinks({ current }: { current: Place }) {
  const { summary } = useWorkbench();
  return (
    <ul className={css.places}>
      {PLACES.map((place) => (
        <li key={place.path}>
          <a href={hrefOf(place.path)} aria-current={place.path === current.path ? "page" : undefined}>
            {place.label}
            {place.count === null || summary === null ? null : (
              <span className={css.count}>{formatNumber(summary[place.count])}</span>
            )}
          </a>
        </li>
      ))}
    </ul>
  );
}

function ThemeSwitch() {
  const { theme, switchTheme } = useTheme();
  const words = theme === "light" ? "Dark paper" : "Light paper";
  return (
    <button type="button" className={css.theme} onClick={switchTheme} aria-label={words} title={words}>
      <svg width="14" height="14" aria-hidden="true">
        <circle cx="7" cy="7" r="6" className="f-none s-soft" strokeWidth="1.4" />
        <path d="M7 1A6 6 0 0 1 7 13Z" fill="var(--soft)" />
      </svg>
    </button>
  );
}
