/** Reads the input of a request against its check and says in words what is wrong with it. */
import { AppError } from "../domain/errors.ts";
import { type RequestInput, type RequestName, requestInputs } from "./requests.ts";

export function isRequestName(name: string): name is RequestName {
  return Object.hasOwn(requestInputs, name);
}

/** The checked input; refuses with an AppError that names each field and what it should be. */
export function checkInput<Name extends RequestName>(name: Name, input: unknown): RequestInput<Name> {
  const result = requestInputs[name].safeParse(input ?? {});
  if (result.success) return result.data as RequestInput<Name>;
  const faults = result.error.issues
    .slice(0, 5)
    .map((issue) => `${issue.path.length === 0 ? "the whole input" : issue.path.join(".")}: ${issue.message}`);
  throw new AppError({
    family: "request",
    code: "bad-input",
    what: `The request "${name}" could not be read: ${faults.join("; ")}.`,
    where: name,
    whatToDo: "Correct the named fields and ask again.",
  });
}
