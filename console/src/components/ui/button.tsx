import type { ComponentProps } from "react";
import { Link, type LinkProps } from "react-router-dom";
import { joinClasses } from "./join-classes.ts";

type Look = "main" | "plain" | "grave";

const shape =
  "inline-flex min-h-9 cursor-pointer items-center justify-center gap-2 border px-3 py-1.5 leading-tight select-none disabled:cursor-default disabled:opacity-50 no-print";
const looks: Record<Look, string> = {
  main: "border-ink bg-ink text-sheet hover:not-disabled:bg-muted hover:not-disabled:border-muted",
  plain: "border-rule text-ink hover:not-disabled:border-ink hover:not-disabled:bg-well",
  grave: "border-signal text-signal hover:not-disabled:bg-signal hover:not-disabled:text-sheet",
};

interface ButtonProps extends ComponentProps<"button"> {
  look?: Look;
  /** Its work is under way: it says so and takes no second press. */
  busy?: boolean;
}

export function Button({
  look = "plain",
  busy = false,
  className,
  disabled,
  children,
  ...rest
}: ButtonProps) {
  return (
    <button
      type="button"
      {...rest}
      className={joinClasses(shape, looks[look], className)}
      disabled={disabled === true || busy}
      aria-busy={busy}
    >
      {children}
      {busy && <span aria-hidden="true">…</span>}
    </button>
  );
}

export function ButtonLink({ look = "plain", className, ...rest }: LinkProps & { look?: Look }) {
  return <Link {...rest} className={joinClasses(shape, looks[look], className)} />;
}
