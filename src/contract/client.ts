/** The typed way to ask: the screens' one door to the core, whatever carries the words. */
import type { PlainError } from "../domain/errors.ts";
import type { Reply } from "./reply.ts";
import type { RequestInput, RequestName, RequestOutput } from "./requests.ts";

/** Carries a name and an input to the core: the window's bridge, or HTTP on the loopback address. */
export type Transport = (name: string, input: unknown) => Promise<Reply<unknown>>;

/** Thrown by the client when the core refuses; holds the plain error for the screen to say. */
export class RequestRefused extends Error {
  readonly plain: PlainError;
  constructor(plain: PlainError) {
    super(plain.what);
    this.name = "RequestRefused";
    this.plain = plain;
  }
}

export interface Client {
  ask<Name extends RequestName>(name: Name, input: RequestInput<Name>): Promise<RequestOutput<Name>>;
}

export function createClient(transport: Transport): Client {
  return {
    async ask(name, input) {
      const reply = await transport(name, input);
      if (!reply.ok) throw new RequestRefused(reply.error);
      return reply.value as RequestOutput<typeof name>;
    },
  };
}

/** Handlers by request name: what app/ provides and a shell calls after checkInput. */
export type Handlers = {
  readonly [Name in RequestName]: (input: RequestInput<Name>) => Promise<RequestOutput<Name>> | RequestOutput<Name>;
};
