/** How each attribute of the set enters: its form, how a choice reads, and what becomes of levels with few sales. */
import type { Attribute } from "../../domain/attribute.ts";
import type { ChoiceReading, ModelAttribute, PriceModel, RareLevels } from "../../domain/priceModel.ts";
import { SectionHeading } from "../parts/index.ts";
import type { Workbench } from "../workbench/workbench.ts";
import { setForm, setRareLevels, setReading } from "./fitChanges.ts";
import place from "./PriceModelPlace.module.css";
import css from "./settings.module.css";

const USUAL_KNOTS = 4;
const KNOTS: readonly number[] = [3, 4, 5, 6, 7];

export function AttributeForms({ bench, model }: { bench: Workbench; model: PriceModel }) {
  const rows = model.attributes.flatMap((member) => {
    const attribute = bench.assetClass?.attributes.find((one) => one.key === member.key);
    return attribute === undefined || attribute.kind === "yesNo" ? [] : [{ member, attribute }];
  });
  if (rows.length === 0) return null;
  return (
    <div className={place.section}>
      <SectionHeading>How attributes enter</SectionHeading>
      <table className={css.forms}>
        <caption className="vh">Form of each attribute of the set</caption>
        <tbody>
          {rows.map(({ member, attribute }) => (
            <tr key={member.key}>
              <th scope="row">{attribute.label}</th>
              {attribute.kind === "choice" ? (
                <ChoiceCells bench={bench} member={member} attribute={attribute} />
              ) : (
                <NumberCell bench={bench} member={member} attribute={attribute} />
              )}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

interface CellProps {
  readonly bench: Workbench;
  readonly member: ModelAttribute;
  readonly attribute: Attribute;
}

function NumberCell({ bench, member, attribute }: CellProps) {
  const value = member.form === "spline" ? `spline ${member.knots ?? USUAL_KNOTS}` : member.form;
  const choose = (chosen: string): void => {
    const [form, knots] = chosen.split(" ");
    bench.changeModel((now) => setForm(now, member.key, form as "line" | "ln" | "spline", Number(knots)));
  };
  return (
    <td colSpan={2}>
      <select
        className={css.pick}
        aria-label={`Form of ${attribute.label}`}
        value={value}
        onChange={(event) => choose(event.target.value)}
      >
        <option value="line">straight line</option>
        <option value="ln">logarithm</option>
        {KNOTS.map((knots) => (
          <option key={knots} value={`spline ${knots}`}>
            curve with {knots} knots
          </option>
        ))}
      </select>
    </td>
  );
}

function ChoiceCells({ bench, member, attribute }: CellProps) {
  return (
    <>
      <td>
        <select
          className={css.pick}
          aria-label={`How ${attribute.label} reads`}
          value={member.reading ?? "reference"}
          onChange={(event) =>
            bench.changeModel((now) => setReading(now, member.key, event.target.value as ChoiceReading))
          }
        >
          <option value="reference">against one level</option>
          <option value="sumToZero">against the mean of levels</option>
        </select>
      </td>
      <td>
        <select
          className={css.pick}
          aria-label={`Levels of ${attribute.label} with few sales`}
          value={member.rare ?? "keep"}
          onChange={(event) =>
            bench.changeModel((now) => setRareLevels(now, member.key, event.target.value as RareLevels))
          }
        >
          <option value="keep">rare levels kept</option>
          <option value="merge">rare levels merged</option>
          <option value="pool">levels drawn together</option>
        </select>
      </td>
    </>
  );
}
