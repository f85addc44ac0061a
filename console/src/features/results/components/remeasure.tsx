interface RemeasureProps {
  stations: readonly string[];
  title?: string;
}

/** What to measure after the last move, in order: the axis first, then whatever moved. */
export function Remeasure({
  stations,
  title = "Measure again after the last move, in this order",
}: RemeasureProps) {
  if (stations.length === 0) return null;
  return (
    <section aria-label="Measure again" className="keep-together">
      <h3 className="font-semibold">{title}</h3>
      <ol className="mt-2 flex flex-wrap gap-x-6 gap-y-1">
        {stations.map((station, index) => (
          <li key={station} className="whitespace-nowrap">
            <span className="text-xs text-muted">{index + 1} </span>
            {station}
          </li>
        ))}
      </ol>
    </section>
  );
}
