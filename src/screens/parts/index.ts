/** Everything a place is put together from. */
export { Button, type ButtonProps } from "./Button.tsx";
export { Field, type FieldProps } from "./Field.tsx";
export { Busy, EmptyState, ErrorNote, InlineAsk, type InlineAskProps, Notice, type NoticeProps } from "./notices.tsx";
export { PaneLayout, type PaneLayoutProps } from "./PaneLayout.tsx";
export { SegmentedChoice, type SegmentedChoiceProps } from "./SegmentedChoice.tsx";
export { SubPlaces, type SubPlacesProps } from "./SubPlaces.tsx";
export { KeyCap, SectionHeading, Sentence, StrongMoney, TextLink, type TextLinkProps } from "./words.tsx";
