/** A long sheet's sections, by the name of each. */
const sections = [
  ["checks", "Set-up checks"],
  ["surveys", "Surveys"],
  ["plan", "Plan"],
  ["follow", "Follow a move"],
  ["moves", "Moves"],
  ["confirmation", "Confirmation"],
  ["concessions", "Concessions"],
  ["axis", "New axis"],
  ["comments", "Comments"],
  ["attachments", "Attachments"],
  ["details", "Details"],
  ["reports", "Reports"],
] as const;

export function SheetContents() {
  return (
    <nav aria-label="On this sheet" className="no-print">
      <ul className="flex flex-wrap gap-x-5 gap-y-1 text-xs">
        {sections.map(([id, words]) => (
          <li key={id}>
            <a className="link" href={`#${id}`}>
              {words}
            </a>
          </li>
        ))}
      </ul>
    </nav>
  );
}
