/** Puts text on the clipboard; answers whether it is there. Works on a plain http LAN too, where the modern way is barred. */
export async function copyText(text: string): Promise<boolean> {
  if (window.isSecureContext) {
    try {
      await navigator.clipboard.writeText(text);
      return true;
    } catch {
      // Refused (focus elsewhere, permission): the older way may still do.
    }
  }
  return copyThroughSelection(text);
}

function copyThroughSelection(text: string): boolean {
  const holder = document.createElement("textarea");
  holder.value = text;
  holder.readOnly = true;
  holder.className = "sr-only";
  const focused = document.activeElement;
  (focused?.closest("dialog") ?? document.body).append(holder);
  holder.select();
  // Deprecated, and the only way outside a secure context.
  const copied = document.execCommand("copy");
  holder.remove();
  if (focused instanceof HTMLElement) focused.focus();
  return copied;
}
