/** More than the longest page has room for: what does not fit is cut off. */
const columns = Array.from({ length: 40 }, (_, index) => String(index + 1));
/** Without I and O, which read as one and nought; doubled after Z, as ISO 5457 goes on. */
const letters = [..."ABCDEFGHJKLMNPQRSTUVWXYZ"];
const rows = [...letters, ...letters.map((letter) => letter + letter)];

/** The grid reference along the sheet's four edges. It says nothing to who hears the page. */
export function SheetZones() {
  return (
    <div aria-hidden="true">
      <Edge along="sheet-zones-x top-0" marks={columns} />
      <Edge along="sheet-zones-x bottom-0" marks={columns} />
      <Edge along="sheet-zones-y left-0" marks={rows} />
      <Edge along="sheet-zones-y right-0" marks={rows} />
    </div>
  );
}

function Edge({ along, marks }: { along: string; marks: readonly string[] }) {
  return (
    <div className={`sheet-zones ${along}`}>
      {marks.map((mark) => (
        <span key={mark}>{mark}</span>
      ))}
    </div>
  );
}
