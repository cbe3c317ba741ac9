/** How the file is read: each option as detected, with the sentence that says why, and each changeable. */
import type { ReadingOptions } from "../../../domain/importRecord.ts";
import { SectionHeading } from "../../parts/index.ts";
import css from "./BringIn.module.css";
import { type OptionName, sortSentences } from "./detectedSentences.ts";

type Choices = { readonly [Name in OptionName]: readonly { value: ReadingOptions[Name]; label: string }[] };

const CHOICES: Choices = {
  encoding: [
    { value: "utf-8", label: "UTF-8" },
    { value: "windows-1252", label: "Windows-1252" },
    { value: "utf-16le", label: "UTF-16 LE" },
    { value: "utf-16be", label: "UTF-16 BE" },
  ],
  delimiter: [
    { value: ";", label: "semicolon ;" },
    { value: ",", label: "comma ," },
    { value: "\t", label: "tab" },
    { value: "|", label: "bar |" },
  ],
  decimalMark: [
    { value: ".", label: "point 0.5" },
    { value: ",", label: "comma 0,5" },
  ],
  thousandsMark: [
    { value: "", label: "none 1000" },
    { value: ".", label: "point 1.000" },
    { value: ",", label: "comma 1,000" },
    { value: " ", label: "space 1 000" },
    { value: "'", label: "apostrophe 1'000" },
  ],
  dateOrder: [
    { value: "dmy", label: "day month year" },
    { value: "mdy", label: "month day year" },
    { value: "ymd", label: "year month day" },
  ],
  hasHeading: [
    { value: true, label: "headings" },
    { value: false, label: "a sale already" },
  ],
};

const LABELS: Readonly<Record<OptionName, string>> = {
  encoding: "Letters",
  delimiter: "Cells apart by",
  decimalMark: "Decimal mark",
  thousandsMark: "Thousands",
  dateOrder: "Dates",
  hasHeading: "First row holds",
};

const ORDER: readonly OptionName[] = [
  "encoding",
  "delimiter",
  "decimalMark",
  "thousandsMark",
  "dateOrder",
  "hasHeading",
];

export interface ReadingOptionsFormProps {
  readonly options: ReadingOptions;
  readonly detected: readonly string[];
  readonly onChange: (change: Partial<ReadingOptions>) => void;
}

export function ReadingOptionsForm({ options, detected, onChange }: ReadingOptionsFormProps) {
  const { by, rest } = sortSentences(detected);
  return (
    <section aria-labelledby="how-read">
      <SectionHeading id="how-read" aside="as detected; change what is wrong">
        How the file is read
      </SectionHeading>
      <dl className={css.options}>
        {ORDER.map((name) => (
          <div key={name}>
            <dt>
              <label htmlFor={`read-${name}`}>{LABELS[name]}</label>
            </dt>
            <dd>
              <select
                id={`read-${name}`}
                value={CHOICES[name].findIndex(({ value }) => value === options[name])}
                onChange={(event) => onChange({ [name]: CHOICES[name][Number(event.target.value)]!.value })}
              >
                {CHOICES[name].map(({ label }, at) => (
                  <option key={label} value={at}>
                    {label}
                  </option>
                ))}
              </select>
              <span className="soft small">{by[name]}</span>
            </dd>
          </div>
        ))}
      </dl>
      {rest.length === 0 ? null : (
        <ul className={css.notes}>
          {rest.map((sentence) => (
            <li key={sentence}>{sentence}</li>
          ))}
        </ul>
      )}
    </section>
  );
}
