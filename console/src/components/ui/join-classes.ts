/** Class names that apply, in one attribute. */
export function joinClasses(...names: readonly (string | false | null | undefined)[]): string {
  return names.filter(Boolean).join(" ");
}
