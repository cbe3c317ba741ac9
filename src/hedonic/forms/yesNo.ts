/** Yes/no: one column, 1 for yes. */
import { type AttributeFormRule, PLAIN } from "./form.ts";

export const yesNo: AttributeFormRule = {
  label: "yes or no",
  columns: ({ stored }) => ({
    ...PLAIN,
    columns: [{ level: "yes", values: stored }],
    reference: "no",
    step: 1,
    stepWords: null,
    unit: null,
    numbersAt: (value) => [value === true || value === 1 || value === "yes" ? 1 : 0],
  }),
};
