export const themes = ["system", "light", "dark"] as const;
export type Theme = (typeof themes)[number];

const storageKey = "borewright.theme";

/** What `theme.js` set on the page before the first paint. */
export function readTheme(): Theme {
  const chosen = document.documentElement.dataset["theme"];
  return themes.find((theme) => theme === chosen) ?? "system";
}

export function chooseTheme(theme: Theme): void {
  if (theme === "system") delete document.documentElement.dataset["theme"];
  else document.documentElement.dataset["theme"] = theme;
  try {
    if (theme === "system") localStorage.removeItem(storageKey);
    else localStorage.setItem(storageKey, theme);
  } catch {
    // Storage is barred: the choice lasts as long as the page.
  }
}
