import { FigureView } from "../../../components/ui/figure-view.tsx";
import { confirmationMethods } from "../content/confirmation-methods.ts";
import { planMethods } from "../content/plan-methods.ts";
import { repeatabilityMethods } from "../content/repeatability-methods.ts";
import { sightMethods } from "../content/sight-methods.ts";
import { targetMethods } from "../content/target-methods.ts";
import { drawColdTarget } from "../drawings/draw-cold-target.ts";
import { MethodSheet } from "./method-sheet.tsx";

export function ColdTargets() {
  return (
    <>
      <FigureView number={1} draw={drawColdTarget} />
      <MethodSheet methods={targetMethods} />
    </>
  );
}

export function Confirmations() {
  return <MethodSheet methods={confirmationMethods} />;
}

export function Repeatability() {
  return <MethodSheet methods={repeatabilityMethods} />;
}

export function LineOfSight() {
  return <MethodSheet methods={sightMethods} />;
}

export function MeasurementPlans() {
  return <MethodSheet methods={planMethods} />;
}
