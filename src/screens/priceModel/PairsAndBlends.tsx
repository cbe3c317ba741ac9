/** Attributes that enter together: products of pairs, and blends of attributes that measure the same thing. */
import { useState } from "react";
import type { Attribute } from "../../domain/attribute.ts";
import { listWords, lowerStart } from "../../domain/format.ts";
import type { Blend, PriceModel } from "../../domain/priceModel.ts";
import { Button, SectionHeading, TextLink } from "../parts/index.ts";
import type { Workbench } from "../workbench/workbench.ts";
import { addInteraction, blendOf, putBlend, removeBlend, removeInteraction } from "./fitChanges.ts";
import place from "./PriceModelPlace.module.css";
import css from "./settings.module.css";

export function PairsAndBlends({ bench, model }: { bench: Workbench; model: PriceModel }) {
  const members = (bench.assetClass?.attributes ?? []).filter((one) =>
    model.attributes.some((member) => member.key === one.key),
  );
  if (members.length < 2) return null;
  return (
    <div className={place.section}>
      <SectionHeading>Attributes that enter together</SectionHeading>
      <Pairs bench={bench} model={model} members={members} />
      <Blends bench={bench} model={model} members={members} />
    </div>
  );
}

interface PartProps {
  readonly bench: Workbench;
  readonly model: PriceModel;
  readonly members: readonly Attribute[];
}

function labelIn(members: readonly Attribute[], key: string): string {
  return members.find((one) => one.key === key)?.label ?? key;
}

/** The effect of one may depend on the other: their product enters beside both. */
function Pairs({ bench, model, members }: PartProps) {
  const [first, setFirst] = useState("");
  const [second, setSecond] = useState("");
  const isReady = first !== "" && second !== "" && first !== second;
  const add = (): void => {
    bench.changeModel((now) => addInteraction(now, first, second));
    setFirst("");
    setSecond("");
  };
  return (
    <>
      <ul className={css.together}>
        {(model.interactions ?? []).map(({ a, b }) => (
          <li key={`${a}*${b}`}>
            What {lowerStart(labelIn(members, a))} does may depend on {lowerStart(labelIn(members, b))}{" "}
            <TextLink onPress={() => bench.changeModel((now) => removeInteraction(now, a, b))}>Take out</TextLink>
          </li>
        ))}
      </ul>
      <p className={css.adder}>
        <AttributePick label="What this attribute does" members={members} value={first} onPick={setFirst} />
        <span>may depend on</span>
        <AttributePick label="may depend on this one" members={members} value={second} onPick={setSecond} />
        <Button disabled={!isReady} onClick={add}>
          Put in
        </Button>
      </p>
    </>
  );
}

interface AttributePickProps {
  readonly label: string;
  readonly members: readonly Attribute[];
  readonly value: string;
  readonly onPick: (key: string) => void;
}

function AttributePick({ label, members, value, onPick }: AttributePickProps) {
  return (
    <select className={css.pick} aria-label={label} value={value} onChange={(event) => onPick(event.target.value)}>
      <option value="">attribute …</option>
      {members.map((one) => (
        <option key={one.key} value={one.key}>
          {one.label}
        </option>
      ))}
    </select>
  );
}

const WEIGHTING: Readonly<Record<Blend["weighting"], string>> = {
  equal: "each the same weight",
  firstComponent: "weights that spread the sales most",
  own: "own weights",
};

function Blends({ bench, model, members }: PartProps) {
  const blends = model.blends ?? [];
  return (
    <>
      {blends.map((blend) => (
        <BlendRow key={blend.key} bench={bench} blend={blend} members={members} />
      ))}
      <NewBlend bench={bench} members={members} blends={blends} />
    </>
  );
}

function BlendRow({ bench, blend, members }: { bench: Workbench; blend: Blend; members: readonly Attribute[] }) {
  const put = (next: Blend): void => bench.changeModel((now) => putBlend(now, next));
  const change = (key: string, part: Partial<Blend["members"][number]>): void =>
    put({ ...blend, members: blend.members.map((one) => (one.key === key ? { ...one, ...part } : one)) });
  return (
    <fieldset className={css.blend}>
      <legend>
        <input
          aria-label="Name of the blend"
          value={blend.label}
          maxLength={80}
          onChange={(event) => put({ ...blend, label: event.target.value })}
        />{" "}
        <TextLink onPress={() => bench.changeModel((now) => removeBlend(now, blend.key))}>Take apart</TextLink>
      </legend>
      <select
        className={css.pick}
        aria-label={`Weights of ${blend.label}`}
        value={blend.weighting}
        onChange={(event) => put({ ...blend, weighting: event.target.value as Blend["weighting"] })}
      >
        {Object.entries(WEIGHTING).map(([value, label]) => (
          <option key={value} value={value}>
            {label}
          </option>
        ))}
      </select>
      <ul className={css.together}>
        {blend.members.map((member) => (
          <li key={member.key}>
            <button
              type="button"
              className={css.sign}
              aria-label={`${labelIn(members, member.key)} counts ${member.sign === 1 ? "as it rises" : "as it falls"}; turn it round`}
              onClick={() => change(member.key, { sign: member.sign === 1 ? -1 : 1 })}
            >
              {member.sign === 1 ? "+" : "−"}
            </button>{" "}
            {labelIn(members, member.key)}
            {blend.weighting !== "own" ? null : (
              <input
                type="number"
                min="0"
                step="0.1"
                aria-label={`Weight of ${labelIn(members, member.key)}`}
                value={member.weight}
                onChange={(event) => change(member.key, { weight: Math.max(0, Number(event.target.value)) })}
              />
            )}
          </li>
        ))}
      </ul>
    </fieldset>
  );
}

function NewBlend({
  bench,
  members,
  blends,
}: {
  bench: Workbench;
  members: readonly Attribute[];
  blends: readonly Blend[];
}) {
  const [chosen, setChosen] = useState<readonly string[]>([]);
  const taken = new Set(blends.flatMap((one) => one.members.map(({ key }) => key)));
  const free = members.filter((one) => (one.kind === "number" || one.kind === "built") && !taken.has(one.key));
  if (free.length < 2) return null;
  const picked = free.filter((one) => chosen.includes(one.key));
  const toggle = (key: string): void =>
    setChosen((now) => (now.includes(key) ? now.filter((one) => one !== key) : [...now, key]));
  const make = (): void => {
    bench.changeModel((now) => putBlend(now, blendOf(picked, "equal")));
    setChosen([]);
  };
  return (
    <details className={css.blendMaker}>
      <summary>Make one attribute of several</summary>
      <p className="small soft">
        For attributes that measure the same thing, such as age and hours: one standardised mean enters in their place.
      </p>
      <p className={css.adder}>
        {free.map((one) => (
          <label key={one.key}>
            <input type="checkbox" checked={chosen.includes(one.key)} onChange={() => toggle(one.key)} /> {one.label}
          </label>
        ))}
      </p>
      <Button disabled={picked.length < 2} onClick={make}>
        {picked.length < 2 ? "Blend" : `Blend ${listWords(picked.map((one) => lowerStart(one.label)))}`}
      </Button>
    </details>
  );
}
