import { useId } from "react";
import { Button } from "../../../components/ui/button.tsx";

interface BoreChoiceProps {
  ids: readonly string[];
  index: number;
  onChoose: (id: string) => void;
}

/** Which bore the figure shows: by name, or one on and one back. */
export function BoreChoice({ ids, index, onChoose }: BoreChoiceProps) {
  const id = useId();
  const step = (by: number) => {
    const next = ids[index + by];
    return (
      <Button
        className="min-h-10"
        disabled={next === undefined}
        onClick={() => next !== undefined && onChoose(next)}
      >
        {by < 0 ? "Previous" : "Next"}
      </Button>
    );
  };
  return (
    <div className="no-print flex flex-wrap items-end gap-2">
      <div className="min-w-48">
        <label htmlFor={id} className="field-name mb-1 block">
          Bore shown, {index + 1} of {ids.length}
        </label>
        <select
          id={id}
          className="control"
          value={ids[index]}
          onChange={(event) => onChoose(event.target.value)}
        >
          {ids.map((name) => (
            <option key={name}>{name}</option>
          ))}
        </select>
      </div>
      {step(-1)}
      {step(1)}
    </div>
  );
}
