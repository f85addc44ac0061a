import { inertText } from "../../../shared/figures/inert-text.ts";
import { paperColours } from "../../../shared/figures/paper-colours.ts";
import {
  lettering,
  onClock,
  pens,
  type Fill,
  type Figure,
  type Pen,
  type Shape,
} from "../../../shared/figures/shape.ts";

const margin = 5;
const fonts = "'IBM Plex Mono', 'DejaVu Sans Mono', monospace";

/** A figure as a file of its own, at true size in millimetres. SVG 1.1: shapes and text alone, nothing that runs or loads. */
export function writeSvg(figure: Figure): string {
  const width = figure.width + 2 * margin;
  const height = figure.height + 2 * margin;
  return [
    '<?xml version="1.0" encoding="UTF-8"?>',
    `<svg xmlns="http://www.w3.org/2000/svg" width="${round(width)}mm" height="${round(height)}mm" viewBox="${-margin} ${-margin} ${round(width)} ${round(height)}" role="img" aria-labelledby="title" aria-describedby="words">`,
    `<title id="title">${escapeXml(figure.title)}</title>`,
    `<desc id="words">${escapeXml(figure.alternative)}</desc>`,
    `<rect x="${-margin}" y="${-margin}" width="${round(width)}" height="${round(height)}" fill="${paperColours.paper}"/>`,
    `<g font-family="${fonts}" fill="none" direction="ltr">`,
    ...figure.shapes.map(writeShape),
    "</g>",
    "</svg>",
    "",
  ].join("\n");
}

function writeShape(shape: Shape): string {
  switch (shape.kind) {
    case "line":
      return element("line", {
        x1: round(shape.from.x),
        y1: round(shape.from.y),
        x2: round(shape.to.x),
        y2: round(shape.to.y),
        ...stroke(shape.pen),
      });
    case "path":
      return element(shape.closed ? "polygon" : "polyline", {
        points: shape.points.map(({ x, y }) => `${round(x)},${round(y)}`).join(" "),
        ...stroke(shape.pen, shape.fill),
      });
    case "circle":
      return element("circle", {
        cx: round(shape.centre.x),
        cy: round(shape.centre.y),
        r: round(shape.radius),
        ...stroke(shape.pen, shape.fill),
      });
    case "arc": {
      const [from, to] = [shape.startDeg, shape.endDeg].map((deg) =>
        onClock(shape.centre, shape.radius, deg),
      );
      const large = shape.endDeg - shape.startDeg > 180 ? 1 : 0;
      const radius = round(shape.radius);
      const d = `M${round(from?.x ?? 0)} ${round(from?.y ?? 0)}A${radius} ${radius} 0 ${large} 1 ${round(to?.x ?? 0)} ${round(to?.y ?? 0)}`;
      return element("path", { d, ...stroke(shape.pen) });
    }
    case "text":
      return element(
        "text",
        {
          x: round(shape.at.x),
          y: round(shape.at.y),
          "font-size": round(shape.height / lettering.capitalPerSize),
          "text-anchor": shape.anchor,
          fill: paperColours[shape.tone],
          // A name of any script stands as it was written, and turns nothing beside it about.
          "unicode-bidi": "bidi-override",
          ...(shape.turnDeg === undefined
            ? {}
            : { transform: `rotate(${-shape.turnDeg} ${round(shape.at.x)} ${round(shape.at.y)})` }),
        },
        shape.text,
      );
  }
}

type Attributes = Readonly<Record<string, string | number>>;

function stroke(pen: Pen | null, fill?: Fill): Attributes {
  const filled: Attributes = fill ? { fill: paperColours[fill] } : {};
  if (pen === null) return filled;
  const { width, tone, ...style } = pens[pen];
  return {
    ...filled,
    stroke: paperColours[tone],
    "stroke-width": width,
    ...("dash" in style ? { "stroke-dasharray": style.dash.join(" ") } : {}),
  };
}

function element(name: string, attributes: Attributes, text?: string): string {
  const written = Object.entries(attributes)
    .map(([attribute, value]) => ` ${attribute}="${escapeXml(String(value))}"`)
    .join("");
  return text === undefined ? `<${name}${written}/>` : `<${name}${written}>${escapeXml(text)}</${name}>`;
}

const escapes: Readonly<Record<string, string>> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "'": "&#39;",
};

/** Text that XML can hold and no reader is misled by. */
export function escapeXml(text: string): string {
  return inertText(text).replaceAll(/[&<>"']/g, (character) => escapes[character] ?? character);
}

/** A hundredth of a sheet millimetre is finer than any screen or printer shows. */
function round(value: number): number {
  return Math.round(value * 100) / 100 || 0;
}
