import type { Problem } from "../../../../shared/schemas/problem.ts";

type Fault = NonNullable<Problem["errors"]>[number];

interface FaultListProps {
  faults: readonly Fault[];
  /** How many the service did not list. */
  more?: number | undefined;
  /** Where a fault stands in the text beside, and how to get there; absent where there is no text. */
  placeOf?: (fault: Fault) => { words: string; go: () => void } | null;
}

/** Every fault at its pointer, with what was sent and what is allowed. */
export function FaultList({ faults, more = 0, placeOf }: FaultListProps) {
  return (
    <ul className="mt-3 grid gap-2">
      {faults.map((fault, index) => {
        const place = placeOf?.(fault) ?? null;
        return (
          <li key={index} className="border-t border-hair pt-2">
            <span className="flex flex-wrap items-baseline gap-x-3">
              <code className="font-semibold break-all">{whereOf(fault)}</code>
              {place !== null && (
                <button type="button" className="link cursor-pointer text-xs" onClick={place.go}>
                  {place.words}
                </button>
              )}
              <span className="text-xs text-muted">{fault.code}</span>
            </span>
            <span className="block">{fault.detail}</span>
            {(fault.value !== undefined || fault.allowed) && (
              <span className="block text-xs text-muted">{writeLimits(fault)}</span>
            )}
          </li>
        );
      })}
      {more > 0 && <li className="border-t border-hair pt-2 text-muted">and {more} more</li>}
    </ul>
  );
}

function whereOf(fault: Fault): string {
  if (fault.pointer !== undefined) return fault.pointer === "" ? "the whole body" : fault.pointer;
  return fault.parameter ?? fault.header ?? "the call";
}

function writeLimits({ value, unit, allowed }: Fault): string {
  const sent =
    value === undefined ? [] : [`sent ${JSON.stringify(value)}${unit === undefined ? "" : ` ${unit}`}`];
  const least = allowed?.min === undefined ? [] : [`least ${allowed.min}`];
  const most = allowed?.max === undefined ? [] : [`most ${allowed.max}`];
  const inUnit = allowed?.unit === undefined || least.length + most.length === 0 ? "" : ` ${allowed.unit}`;
  return [...sent, ...least, ...most].join(", ") + inUnit;
}
