import { lettering, onClock, pens, type Pen, type Shape } from "../../../../shared/figures/shape.ts";

/** One shape of a figure as SVG. Pens and tones become attributes and classes; nothing is styled inline. */
export function ShapeView({ shape }: { shape: Shape }) {
  switch (shape.kind) {
    case "line":
      return (
        <line
          x1={round(shape.from.x)}
          y1={round(shape.from.y)}
          x2={round(shape.to.x)}
          y2={round(shape.to.y)}
          {...stroke(shape.pen)}
        />
      );
    case "path": {
      const points = shape.points.map(({ x, y }) => `${round(x)},${round(y)}`).join(" ");
      const attributes = { points, ...stroke(shape.pen, shape.fill) };
      return shape.closed ? <polygon {...attributes} /> : <polyline {...attributes} />;
    }
    case "circle":
      return (
        <circle
          cx={round(shape.centre.x)}
          cy={round(shape.centre.y)}
          r={round(shape.radius)}
          {...stroke(shape.pen, shape.fill)}
        />
      );
    case "arc": {
      const from = onClock(shape.centre, shape.radius, shape.startDeg);
      const to = onClock(shape.centre, shape.radius, shape.endDeg);
      const large = shape.endDeg - shape.startDeg > 180 ? 1 : 0;
      const path = `M${round(from.x)} ${round(from.y)}A${round(shape.radius)} ${round(shape.radius)} 0 ${large} 1 ${round(to.x)} ${round(to.y)}`;
      return <path d={path} {...stroke(shape.pen)} />;
    }
    case "text":
      return (
        <text
          x={round(shape.at.x)}
          y={round(shape.at.y)}
          fontSize={round(shape.height / lettering.capitalPerSize)}
          textAnchor={shape.anchor}
          className={`fill-${shape.tone}`}
          {...(shape.turnDeg === undefined
            ? {}
            : { transform: `rotate(${-shape.turnDeg} ${round(shape.at.x)} ${round(shape.at.y)})` })}
        >
          {shape.text}
        </text>
      );
  }
}

function stroke(pen: Pen | null, fill?: string) {
  const className = `fill-${fill ?? "none"} line-${pen === null ? "none" : pens[pen].tone}`;
  if (pen === null) return { className };
  const style = pens[pen];
  const dash = "dash" in style ? { strokeDasharray: style.dash.join(" ") } : {};
  return { className, strokeWidth: style.width, ...dash };
}

/** A hundredth of a sheet millimetre is finer than any screen or printer shows. */
function round(value: number): number {
  return Math.round(value * 100) / 100;
}
