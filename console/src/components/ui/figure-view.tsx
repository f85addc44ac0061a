import { useId } from "react";
import type { Figure } from "../../../../shared/figures/shape.ts";
import { ShapeView } from "./shape-view.tsx";
import { useWidth } from "./use-width.ts";

/** Screen pixels of one sheet millimetre: lettering 2.5 mm high is then 11.5 px type. */
const pixelsPerMillimetre = 3.2;
/** Drawn at this width until the page is laid out, and where it never is. */
const widthUnknownMm = 180;

interface FigureViewProps {
  number: number;
  /** Draws the figure for a sheet so many millimetres wide. */
  draw: (widthMm: number) => Figure;
  /** How wide it stands on paper, at true size: at most what A4 leaves inside its frame. */
  printWidthMm?: number;
}

/** A numbered figure drawn for the room it has, so that its lettering is legible on a phone, on a wall and on paper. */
export function FigureView({ number, draw, printWidthMm = 172 }: FigureViewProps) {
  const [ref, widthPx] = useWidth<HTMLElement>();
  const id = useId();
  // Steps of 5 mm: dragging a window redraws now and then, not at every pixel.
  const width =
    widthPx === null ? widthUnknownMm : Math.max(80, Math.floor(widthPx / pixelsPerMillimetre / 5) * 5);
  const figure = draw(width);
  return (
    <figure ref={ref} className="min-w-0">
      <svg
        viewBox={`0 0 ${figure.width} ${figure.height}`}
        className="figure no-print"
        role="img"
        aria-labelledby={`${id}-title`}
        aria-describedby={`${id}-words`}
      >
        <Shapes figure={figure} />
      </svg>
      <Printed figure={draw(printWidthMm)} />
      <figcaption className="mt-3 border-t border-hair pt-2">
        <span id={`${id}-title`} className="font-semibold">
          Figure {number}. {figure.title}
        </span>
        <details className="no-print mt-1 text-muted">
          <summary className="cursor-pointer text-xs">In words</summary>
          <p id={`${id}-words`} className="mt-1 max-w-prose text-xs">
            {figure.alternative}
          </p>
        </details>
      </figcaption>
    </figure>
  );
}

/** The same figure for paper, one sheet millimetre on one of paper: its lettering is 2.5 mm high there. */
function Printed({ figure }: { figure: Figure }) {
  return (
    <svg
      viewBox={`0 0 ${figure.width} ${figure.height}`}
      width={`${figure.width}mm`}
      height={`${figure.height}mm`}
      className="figure-printed"
      aria-hidden="true"
    >
      <Shapes figure={figure} />
    </svg>
  );
}

function Shapes({ figure }: { figure: Figure }) {
  return figure.shapes.map((shape, index) => <ShapeView key={index} shape={shape} />);
}
