import { useId, useState } from "react";
import { chooseTheme, readTheme, themes, type Theme } from "../../lib/theme.ts";

const words: Record<Theme, string> = { system: "as the system", light: "light", dark: "dark" };

export function ThemeChoice() {
  const id = useId();
  const [theme, setTheme] = useState(readTheme);
  return (
    <span className="inline-flex items-center gap-2">
      <label htmlFor={id}>Theme</label>
      <select
        id={id}
        value={theme}
        className="border border-hair bg-sheet px-1 py-1 text-ink"
        onChange={(event) => {
          const chosen = themes.find((known) => known === event.target.value) ?? "system";
          chooseTheme(chosen);
          setTheme(chosen);
        }}
      >
        {themes.map((known) => (
          <option key={known} value={known}>
            {words[known]}
          </option>
        ))}
      </select>
    </span>
  );
}
