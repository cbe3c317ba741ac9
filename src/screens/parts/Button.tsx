/** A button with a verb on it. The one next step of a screen is `primary`; there is never more than one. */
import type { ButtonHTMLAttributes, ReactNode } from "react";
import css from "./parts.module.css";

export interface ButtonProps extends Omit<ButtonHTMLAttributes<HTMLButtonElement>, "className" | "type"> {
  readonly children: ReactNode;
  readonly primary?: boolean;
  readonly type?: "button" | "submit";
}

export function Button({ children, primary = false, type = "button", ...rest }: ButtonProps) {
  return (
    <button {...rest} type={type} className={primary ? `${css.button} ${css.primary}` : css.button}>
      {children}
    </button>
  );
}
