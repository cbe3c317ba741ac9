/**
 * The attribute set: tiles stand on the rail when in the model and hang below it when left out, with the reason in words. Space
 * switches, F changes the form, arrows go along the rail.
 */
import type { KeyboardEvent } from "react";
import { CHANNEL_KEY } from "../../domain/attribute.ts";
import { formatNumber, listWords, lowerStart } from "../../domain/format.ts";
import { KeyCap } from "../parts/index.ts";
import type { Workbench } from "../workbench/workbench.ts";
import { cycleForm, isIn, setReferenceLevel, switchAttribute } from "./modelChanges.ts";
import css from "./PriceModelPlace.module.css";
import type { TileFacts, TileState } from "./tiles.ts";

const LOOK: Readonly<Record<TileState, string>> = {
  in: "",
  justNow: `${css.out} ${css.justNow}`,
  person: css.out ?? "",
  exact: `${css.out} ${css.exact}`,
  notKnown: css.out ?? "",
  outside: `${css.out} ${css.outside}`,
};

export function AttributeRail({ tiles, bench }: { tiles: readonly TileFacts[]; bench: Workbench }) {
  const { model, leftOutJustNow } = bench;
  if (model === null) return null;
  const also = [
    ...(isIn(model, CHANNEL_KEY) ? ["sold through"] : []),
    ...(model.market === "none" ? [] : ["market movement"]),
  ];
  const justNow = tiles.find((tile) => tile.attribute.key === leftOutJustNow);
  const inSet = tiles.filter((tile) => tile.state !== "outside").length;
  return (
    <section className={css.rack} aria-label="Attribute set">
      <div className={css.cap}>
        <h2>Attribute set</h2>
        <span className={css.hint}>
          Tiles on the rail are in the model; those hanging below are left out.
          {also.length === 0 ? "" : ` Also in: ${listWords(also)}.`}
        </span>
        <span className={css.keys}>
          reference set: {inSet === tiles.length ? `all ${formatNumber(inSet)}` : `${inSet} of ${tiles.length}`}
          {"\u00a0\u00a0·\u00a0\u00a0"}
          <KeyCap>Space</KeyCap> switch&nbsp;&nbsp;<KeyCap>F</KeyCap> form
          {bench.canUndo ? (
            <>
              &nbsp;&nbsp;<KeyCap>Ctrl Z</KeyCap>{" "}
              {justNow === undefined ? "undo" : `put ${lowerStart(justNow.attribute.label)} back`}
            </>
          ) : null}
        </span>
      </div>
      <div className={css.lane}>
        <div className={css.rail} aria-hidden="true" />
        <ul className={css.tiles}>
          {tiles.map((tile) => (
            <Tile key={tile.attribute.key} tile={tile} bench={bench} />
          ))}
        </ul>
      </div>
    </section>
  );
}

function focusNeighbour(from: HTMLElement, step: number): void {
  const item = from.closest("li");
  const next = step > 0 ? item?.nextElementSibling : item?.previousElementSibling;
  next?.querySelector<HTMLElement>("[role=switch]")?.focus();
}

function Tile({ tile, bench }: { tile: TileFacts; bench: Workbench }) {
  const { attribute, state } = tile;
  const { changeModel } = bench;
  const press = (event: KeyboardEvent<HTMLButtonElement>): void => {
    if (event.key === "f" || event.key === "F") changeModel((now) => cycleForm(now, attribute.key));
    else if (event.key === "ArrowRight") focusNeighbour(event.currentTarget, 1);
    else if (event.key === "ArrowLeft") focusNeighbour(event.currentTarget, -1);
    else return;
    event.preventDefault();
  };
  const hasReference = attribute.kind === "choice" && state !== "outside" && state !== "notKnown" && state !== "exact";
  return (
    <li className={`${css.tile} ${LOOK[state]}`}>
      {state === "in" ? null : <span className={css.why}>{tile.stateWords}</span>}
      <button
        type="button"
        role="switch"
        className={css.switch}
        aria-checked={state === "in"}
        aria-label={`${attribute.label}, ${tile.stateWords}, ${tile.formWords}`}
        title={tile.sentence ?? undefined}
        onClick={() => changeModel((now) => switchAttribute(now, attribute.key, attribute.kind))}
        onKeyDown={press}
      >
        <b>{attribute.label}</b>
        <span className={hasReference ? `${css.form} ${css.short}` : css.form}>
          {hasReference ? `${tile.formWords}, from` : tile.formWords}
        </span>
      </button>
      {hasReference ? <Reference tile={tile} bench={bench} /> : null}
      <span className={css.dot} aria-hidden="true" />
    </li>
  );
}

function Reference({ tile, bench }: { tile: TileFacts; bench: Workbench }) {
  const { attribute } = tile;
  const usual = tile.reference === null ? "the most frequent" : `${tile.reference}`;
  return (
    <span className={css.reference}>
      <select
        aria-label={`${attribute.label}: the level that the others are read against`}
        value={tile.chosenReference ?? ""}
        onChange={(event) =>
          bench.changeModel((now) =>
            setReferenceLevel(now, attribute.key, event.target.value === "" ? null : event.target.value),
          )
        }
      >
        <option value="">{tile.chosenReference === null ? usual : "the most frequent"}</option>
        {attribute.levels.map((level) => (
          <option key={level} value={level}>
            {level}
          </option>
        ))}
      </select>
    </span>
  );
}
