/** The shape of what is coming, seen only when it takes longer than 200 ms. */
export function Skeleton({ what, lines = 6 }: { what: string; lines?: number }) {
  return (
    <div role="status" className="late">
      <span className="sr-only">Reading {what}</span>
      <div aria-hidden="true" className="grid gap-5 py-3">
        {Array.from({ length: lines }, (_, index) => (
          <div key={index} className={index % 3 === 2 ? "skeleton-line w-2/3" : "skeleton-line"} />
        ))}
      </div>
    </div>
  );
}
