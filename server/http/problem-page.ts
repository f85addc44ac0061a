import type { ProblemKind } from "../../shared/error-codes.ts";

/** A page for a person who followed a problem's `type`. All of its text is our own constant text. */
export function problemPage({ code, status, title, fix }: ProblemKind & { readonly code: string }): string {
  return `<!doctype html>
<html lang="en">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1"><title>${code} — Borewright</title></head>
<body>
<main>
<h1>${code}</h1>
<p>HTTP ${status}. ${title}.</p>
<p>${fix}</p>
<p><a href="/docs/">API docs</a></p>
</main>
</body>
</html>
`;
}
