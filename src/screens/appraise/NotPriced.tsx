/** Why there is no price, in place of the outcome. */
import type { PlainError } from "../../domain/errors.ts";

export function NotPriced({ error }: { readonly error: PlainError | null }) {
  return (
    <div role="status">
      <p className="serif">No price stands here yet.</p>
      {error === null ? (
        <p className="soft">Fill in what is known of the item on the left; what is not known can be ticked so.</p>
      ) : (
        <p>
          {error.what} {error.whatToDo ?? ""}
        </p>
      )}
    </div>
  );
}
