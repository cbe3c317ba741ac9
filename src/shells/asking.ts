/** Typed asking inside this process: a refusal of the core comes back as the AppError it was, a bug as CoreFailure. */
import type { Transport } from "../contract/client.ts";
import type { RequestInput, RequestName, RequestOutput } from "../contract/requests.ts";
import { AppError, type PlainError } from "../domain/errors.ts";

/** A bug that the core has already logged: not for the user to mend. */
export class CoreFailure extends Error {
  readonly plain: PlainError;
  constructor(plain: PlainError) {
    super(plain.what);
    this.plain = plain;
  }
}

export type Ask = <Name extends RequestName>(name: Name, input: RequestInput<Name>) => Promise<RequestOutput<Name>>;

export function askingOver(transport: Transport): Ask {
  return async (name, input) => {
    const reply = await transport(name, input);
    if (reply.ok) return reply.value as RequestOutput<typeof name>;
    const { error } = reply;
    if (error.family === "bug") throw new CoreFailure(error);
    throw new AppError({ ...error, family: error.family });
  };
}
