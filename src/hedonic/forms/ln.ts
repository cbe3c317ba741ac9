/** Natural logarithm of the value: an effect in proportion. A step is 10 % more. */
import { type AttributeFormRule, PLAIN } from "./form.ts";

export const ln: AttributeFormRule = {
  label: "logarithm",
  columns: ({ stored }) => ({
    ...PLAIN,
    columns: [{ level: null, values: stored.map((value) => Math.log(value)) }],
    reference: null,
    step: Math.log(1.1),
    stepWords: "10\u00a0% more",
    unit: null,
    numbersAt: (value) => [Math.log(Number(value))],
  }),
};
