/** Above the register: find, the filters in words, what is picked, and what can be done with it. */
import { useEffect, useRef } from "react";
import type { AttributeEvidence } from "../../domain/appraisal.ts";
import type { AssetClass } from "../../domain/assetClass.ts";
import { formatNumber, lowerStart } from "../../domain/format.ts";
import { goTo } from "../frame/useRoute.ts";
import { Button, KeyCap, TextLink } from "../parts/index.ts";
import { attributeColumns } from "./columns.ts";
import { FilterChoice } from "./FilterChoice.tsx";
import { ChannelPanel, LevelsPanel, NarrowPanel, SoldPanel, StatePanel } from "./filterPanels.tsx";
import { channelWords, isFiltered, NO_FILTER, soldWords, stateWords, valueWords } from "./filters.ts";
import css from "./RegisterBar.module.css";
import type { Register } from "./useRegister.ts";

export interface RegisterBarProps {
  readonly assetClass: AssetClass;
  readonly register: Register;
  readonly evidence: readonly AttributeEvidence[];
  readonly saleCount: number;
}

export function RegisterBar(props: RegisterBarProps) {
  const { register, saleCount } = props;
  const { picked, ask, clearPicks } = register;
  return (
    <div className={css.bar}>
      <Find register={register} saleCount={saleCount} />
      <Filters {...props} />
      <div className={css.acts}>
        {picked.size === 0 ? null : (
          <span className="soft small">
            {formatNumber(picked.size)} picked <TextLink onPress={clearPicks}>clear</TextLink>
          </span>
        )}
        <Button onClick={() => ask("verify")} disabled={register.meant.length === 0}>
          Verify
        </Button>
        <Button onClick={() => goTo("sales", "bring-in")}>Bring in sales</Button>
      </div>
    </div>
  );
}

function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.closest("input, textarea, select") !== null;
}

/** Asked a moment after the last key, so that a register of a million is not searched per letter. */
const PAUSE_MS = 160;

function Find({ register, saleCount }: { register: Register; saleCount: number }) {
  const field = useRef<HTMLInputElement>(null);
  const pause = useRef<ReturnType<typeof setTimeout>>(undefined);
  useEffect(() => {
    const press = (event: KeyboardEvent): void => {
      if (event.key !== "/" || isTyping(event.target)) return;
      event.preventDefault();
      field.current?.focus();
    };
    window.addEventListener("keydown", press);
    return () => window.removeEventListener("keydown", press);
  }, []);
  const { filter } = register.query;
  const find = (search: string): void => {
    clearTimeout(pause.current);
    pause.current = setTimeout(() => register.setFilter({ ...filter, search }), PAUSE_MS);
  };
  return (
    <div className={css.find}>
      <input
        ref={field}
        type="search"
        aria-label="Find sales by title, reference, source or note"
        aria-keyshortcuts="/"
        placeholder={`Find in ${formatNumber(saleCount)} sales`}
        defaultValue={filter.search}
        onChange={(event) => find(event.target.value)}
      />
      <KeyCap>/</KeyCap>
    </div>
  );
}

function Filters({ assetClass, register, evidence }: RegisterBarProps) {
  const { query, setFilter } = register;
  const { filter } = query;
  const attributes = assetClass.attributes.filter(({ archived }) => !archived);
  const main = attributes.find(({ kind }) => kind === "choice") ?? null;
  const others = attributes.filter((attribute) => attribute !== main);
  const narrowed = others.flatMap((attribute) => {
    const part = filter.values[attribute.key];
    return part === undefined ? [] : [valueWords(attribute, part)];
  });
  const levels = main === null ? null : (filter.values[main.key]?.levels ?? null);
  return (
    <div className={css.filters}>
      <FilterChoice label="Sold" words={soldWords(filter)} isSet={filter.soldFrom !== null || filter.soldTo !== null}>
        <SoldPanel filter={filter} onFilter={setFilter} />
      </FilterChoice>
      {main === null ? null : (
        <FilterChoice label={main.label} words={levels === null ? "any" : levels.join(", ")} isSet={levels !== null}>
          <LevelsPanel filter={filter} onFilter={setFilter} attribute={main} />
        </FilterChoice>
      )}
      <FilterChoice label="Through" words={channelWords(filter)} isSet={filter.channels !== null}>
        <ChannelPanel filter={filter} onFilter={setFilter} />
      </FilterChoice>
      <FilterChoice
        label="State"
        words={stateWords(filter)}
        isSet={filter.state !== "any" || filter.verified !== "any"}
      >
        <StatePanel filter={filter} onFilter={setFilter} />
      </FilterChoice>
      <FilterChoice
        label="Narrow"
        words={narrowed.length === 0 ? "nothing" : narrowed.join("; ")}
        isSet={narrowed.length > 0}
      >
        <NarrowPanel filter={filter} onFilter={setFilter} attributes={others} evidence={evidence} />
      </FilterChoice>
      {isFiltered(filter) ? (
        <TextLink onPress={() => setFilter({ ...NO_FILTER, search: filter.search })}>show all</TextLink>
      ) : null}
    </div>
  );
}

export interface ColumnChoiceProps {
  readonly assetClass: AssetClass;
  readonly hidden: ReadonlySet<string>;
  readonly onHide: (hidden: ReadonlySet<string>) => void;
}

export function ColumnChoice(props: ColumnChoiceProps) {
  const { hidden } = props;
  return (
    <FilterChoice label="Columns" words={hidden.size === 0 ? "usual" : "chosen"} isSet={hidden.size > 0} opensUp>
      <ColumnPanel {...props} />
    </FilterChoice>
  );
}

function ColumnPanel({ assetClass, hidden, onHide }: ColumnChoiceProps) {
  return (
    <>
      {attributeColumns(assetClass.attributes).map(({ id, attribute }) => (
        <label key={id} className={css.tick}>
          <input
            type="checkbox"
            checked={!hidden.has(id)}
            onChange={(event) => {
              const next = new Set(hidden);
              if (event.target.checked) next.delete(id);
              else next.add(id);
              onHide(next);
            }}
          />
          {lowerStart(attribute?.label ?? id)}
        </label>
      ))}
      <p className="fine soft">As many stand in the register as its width allows.</p>
    </>
  );
}
