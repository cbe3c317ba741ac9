/** Views inside a place, as links: text with an underline under the one shown. */
import css from "./parts.module.css";

export interface SubPlacesProps {
  readonly label: string;
  readonly places: readonly { href: string; label: string; isCurrent: boolean }[];
}

export function SubPlaces({ label, places }: SubPlacesProps) {
  return (
    <nav aria-label={label} className={css.subPlaces}>
      {places.map((place) => (
        <a key={place.href} href={place.href} aria-current={place.isCurrent ? "page" : undefined}>
          {place.label}
        </a>
      ))}
    </nav>
  );
}
