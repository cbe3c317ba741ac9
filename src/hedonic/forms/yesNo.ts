/** Yes/no: one column, 1 for yes. */
import type { AttributeFormRule } from "./form.ts";

export const yesNo: AttributeFormRule = {
  label: "yes or no",
  columns: ({ stored }) => ({
    columns: [{ level: "yes", values: stored }],
    reference: "no",
    step: 1,
    stepWords: null,
    unit: null,
  }),
  subject: (value) => [value === true || value === 1 || value === "yes" ? 1 : 0],
};
