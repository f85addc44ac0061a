/** Lines of at most `room` characters, broken between words and, where one is longer than a line, inside it. */
export function wrapText(text: string, room: number): string[] {
  const width = Math.max(1, Math.floor(room));
  return text.split("\n").flatMap((paragraph) => wrapParagraph(paragraph, width));
}

function wrapParagraph(paragraph: string, width: number): string[] {
  const lines: string[] = [];
  let line = "";
  for (const word of paragraph.split(" ").flatMap((one) => cutWord(one, width))) {
    if (line === "") line = word;
    else if (line.length + 1 + word.length <= width) line = `${line} ${word}`;
    else {
      lines.push(line);
      line = word;
    }
  }
  return [...lines, line];
}

function cutWord(word: string, width: number): string[] {
  if (word.length <= width) return [word];
  // By whole characters: half of one is none.
  const all = [...word];
  return Array.from({ length: Math.ceil(all.length / width) }, (_, index) =>
    all.slice(index * width, (index + 1) * width).join(""),
  );
}

/** One line of at most `room` characters; what is cut off is told by an ellipsis. */
export function cutLine(text: string, room: number): string {
  const width = Math.max(1, Math.floor(room));
  return text.length <= width ? text : `${text.slice(0, width - 1)}\u2026`;
}
