/** How words stand on the worktable: the opening sentence, a section's heading, a link that acts, a key cap. */
import type { ReactNode } from "react";
import css from "./parts.module.css";

/** Opens a result: one plain sentence, with <strong> around its numbers. `narrow` for a narrow pane. */
export function Sentence({ children, narrow = false }: { children: ReactNode; narrow?: boolean }) {
  return <p className={narrow ? `${css.sentence} ${css.narrow}` : css.sentence}>{children}</p>;
}

/** h2 with a hairline below; `aside` (a unit, a legend, a link) stands at its right end. */
export function SectionHeading({ children, aside, id }: { children: ReactNode; aside?: ReactNode; id?: string }) {
  return (
    <h2 className={css.heading} id={id}>
      {children}
      {aside === undefined ? null : <span className={css.aside}>{aside}</span>}
    </h2>
  );
}

export type TextLinkProps = { children: ReactNode; title?: string } & (
  | { href: string; onPress?: never }
  | { href?: never; onPress: () => void }
);

/** A link to a place (`href`) or a small act in running text (`onPress`, a button to a screen reader). */
export function TextLink({ children, title, href, onPress }: TextLinkProps) {
  if (href !== undefined) {
    return (
      <a className={css.link} href={href} title={title}>
        {children}
      </a>
    );
  }
  return (
    <button type="button" className={css.link} onClick={onPress} title={title}>
      {children}
    </button>
  );
}

export function KeyCap({ children }: { children: ReactNode }) {
  return <kbd className={css.keyCap}>{children}</kbd>;
}

const MONEY = /([−-]?\p{Sc}\s?\d[\d.,\u00a0\u202f]*\d|[−-]?\p{Sc}\s?\d)/u;

/** A sentence from the core with its amounts set strong. */
export function StrongMoney({ text }: { text: string }) {
  const pieces = text.split(MONEY);
  // Odd pieces are the amounts; a sentence never changes in place, so its pieces can be told by where they stand.
  // biome-ignore lint/suspicious/noArrayIndexKey: see above
  return pieces.map((piece, index) => (index % 2 === 1 ? <strong key={index}>{piece}</strong> : piece));
}
