/** Hands a file to the browser to be saved under `name`. */
export function saveFile(content: Blob, name: string): void {
  const address = URL.createObjectURL(content);
  const link = document.createElement("a");
  link.href = address;
  link.download = name;
  link.click();
  // The browser has taken the file by the next turn; the address would hold it in memory as long as the page lives.
  setTimeout(() => URL.revokeObjectURL(address), 60_000);
}
