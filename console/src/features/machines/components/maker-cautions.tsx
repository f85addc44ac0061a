/** The maker's own, shown with everything that is planned from the machine. */
export function MakerCautions({ cautions }: { cautions: readonly string[] }) {
  if (cautions.length === 0) return null;
  return (
    <section aria-label="The maker's cautions" className="keep-together border-l-4 border-signal pl-4">
      <h2 className="font-semibold">The maker's cautions</h2>
      <ul className="mt-1 grid gap-1">
        {cautions.map((caution) => (
          <li key={caution} className="max-w-prose">
            {caution}
          </li>
        ))}
      </ul>
    </section>
  );
}
