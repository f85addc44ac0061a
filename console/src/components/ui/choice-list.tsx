interface ChoiceListProps {
  legend: string;
  name: string;
  choices: readonly { value: string; words: string; chosen?: boolean }[];
  error?: string | undefined;
}

/** Boxes to tick, each in words with the name that the service knows it by. */
export function ChoiceList({ legend, name, choices, error }: ChoiceListProps) {
  const errorId = `${name}-error`;
  return (
    <fieldset aria-describedby={error === undefined ? undefined : errorId}>
      <legend className="field-name mb-1">{legend}</legend>
      <div className="border border-hair">
        {choices.map(({ value, words, chosen = false }) => (
          <label
            key={value}
            className="flex cursor-pointer items-baseline gap-3 border-b border-hair px-3 py-1.5 last:border-b-0 hover:bg-well"
          >
            <input type="checkbox" name={name} value={value} defaultChecked={chosen} className="accent-ink" />
            <span className="min-w-0">
              {words}
              <span className="block text-xs text-muted">{value}</span>
            </span>
          </label>
        ))}
      </div>
      {error !== undefined && (
        <p id={errorId} className="mt-1 text-xs text-signal">
          {error}
        </p>
      )}
    </fieldset>
  );
}
