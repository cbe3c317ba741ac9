/** Where a file comes in: picked by a press or key, or dropped. */
import { type DragEvent, useId, useState } from "react";
import css from "./BringIn.module.css";

export interface FileDoorProps {
  /** "Pick a file of sales, or drop it here" */
  readonly words: string;
  readonly note: string;
  readonly accept: string;
  readonly onFile: (file: File) => void;
}

export function FileDoor({ words, note, accept, onFile }: FileDoorProps) {
  const [isOver, setOver] = useState(false);
  const id = useId();
  const drop = (event: DragEvent): void => {
    event.preventDefault();
    setOver(false);
    const [file] = event.dataTransfer.files;
    if (file !== undefined) onFile(file);
  };
  return (
    <label
      htmlFor={id}
      className={isOver ? `${css.door} ${css.over}` : css.door}
      onDragOver={(event) => {
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={() => setOver(false)}
      onDrop={drop}
    >
      <input
        id={id}
        type="file"
        accept={accept}
        className="vh"
        onChange={(event) => {
          const [file] = event.target.files ?? [];
          if (file !== undefined) onFile(file);
          event.target.value = "";
        }}
      />
      <b>{words}</b>
      <span className="soft small">{note}</span>
    </label>
  );
}
