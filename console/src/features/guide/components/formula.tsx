import { readFormula } from "../read-formula.ts";

/** A formula as a line of text with its indices and powers: it can be copied, printed and heard. */
export function Formula({ line }: { line: string }) {
  return readFormula(line).map(({ set, text }, index) => {
    if (set === "low") return <sub key={index}>{text}</sub>;
    if (set === "high") return <sup key={index}>{text}</sup>;
    return <span key={index}>{text}</span>;
  });
}

/** Formulas one under the other; a long one scrolls by itself. */
export function Formulas({ lines, label }: { lines: readonly string[]; label: string }) {
  if (lines.length === 0) return null;
  return (
    <div
      className="formulas scroll-x overflow-x-auto border-l-2 border-ink bg-well px-4 py-3"
      role="group"
      aria-label={label}
      tabIndex={0}
    >
      {lines.map((line) => (
        <p key={line} className="w-max whitespace-nowrap">
          <Formula line={line} />
        </p>
      ))}
    </div>
  );
}
