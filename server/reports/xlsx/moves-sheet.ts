import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { momentCell, numberCell, textCell, titleCell, type SheetCell } from "../../spreadsheets/cell.ts";
import type { Sheet } from "../../spreadsheets/sheet.ts";
import { signatureWords } from "../report-words.ts";
import { formatsOf } from "./number-formats.ts";
import { section } from "./section.ts";

/** What was planned, what was done, and what came of it. */
export function movesSheet(record: JobRecord): Sheet {
  const rows: SheetCell[][] = [
    [titleCell(`Moves: ${record.machineName}`)],
    [textCell(signatureWords(record), { fontWeight: "bold" })],
    [],
    ...planned(record),
    ...logged(record),
    ...confirmed(record),
  ];
  return {
    name: "Moves",
    rows,
    widths: [24, 20, 18, 14, 14, 14, 14, 26, 26, 40],
    frozen: { rows: 2, columns: 1 },
  };
}

function planned(record: JobRecord): SheetCell[][] {
  const { across } = formatsOf(record);
  const { offset } = record.machine.units;
  const plan = record.plans.at(-1)?.result;
  if (!plan) return section("Planned", [], "No moves were planned.");
  const moves = plan.components.flatMap(({ id, moves: ideal, realised }) =>
    realised.map(({ support, h, v }) => {
      const wanted = ideal.find((one) => one.support === support);
      return [
        textCell(id),
        textCell(support),
        numberCell(wanted?.h, across),
        numberCell(wanted?.v, across),
        numberCell(h, across),
        numberCell(v, across),
      ];
    }),
  );
  const shims = plan.components.flatMap(({ id, stacks }) =>
    stacks.map(({ support, place, from, to, change, misfit, add, remove }) => [
      textCell(id),
      textCell(support),
      textCell(place),
      numberCell(from, across),
      numberCell(to, across),
      numberCell(change, across),
      numberCell(misfit, across),
      textCell(add.join(" + ")),
      textCell(remove.join(" + ")),
    ]),
  );
  const unreached = plan.components.flatMap(({ id, unreachable }) =>
    unreachable ? [[textCell(id), textCell(unreachable.reason)]] : [],
  );
  const lengths = [
    `Ideal h (${offset})`,
    `Ideal v (${offset})`,
    `Planned h (${offset})`,
    `Planned v (${offset})`,
  ];
  const stackLengths = ["From", "To", "Change", "Misfit"].map((word) => `${word} (${offset})`);
  const pieces = [`Add (${offset})`, `Remove (${offset})`];
  return [
    ...section("Planned", ["Component", "Support", ...lengths], "No part is to move.", moves),
    ...section(
      "Shims",
      ["Component", "Support", "Place", ...stackLengths, ...pieces],
      "No shims were asked for.",
      shims,
    ),
    ...(unreached.length > 0 ? section("Not reached", ["Component", "Reason"], "", unreached) : []),
  ];
}

function logged(record: JobRecord): SheetCell[][] {
  const { across } = formatsOf(record);
  const { offset } = record.machine.units;
  const rows = record.moves.flatMap(({ component, at, person, moved = [], finished, reason, flags }) => {
    const words = flags.map(({ detail }) => detail).join(" ");
    return (moved.length > 0 ? moved : [null]).map((one) => [
      textCell(component),
      textCell(one?.support),
      momentCell(at),
      numberCell(one?.h, across),
      numberCell(one?.v, across),
      textCell(finished ? "yes" : "no"),
      textCell(person),
      textCell(reason),
      textCell(words),
    ]);
  });
  return section(
    "Done",
    [
      "Component",
      "Support",
      "When (UTC)",
      `Moved h (${offset})`,
      `Moved v (${offset})`,
      "Finished and locked",
      "Person",
      "Reason",
      "Flags",
    ],
    "No move was logged.",
    rows,
  );
}

function confirmed(record: JobRecord): SheetCell[][] {
  const { across } = formatsOf(record);
  const { offset } = record.machine.units;
  const result = record.confirmations.at(-1)?.result;
  if (!result) return section("Confirmed", [], "Nothing has been confirmed.");
  const rows = result.moved.map(({ id, planned: plan, achieved, ratio, agrees }) => [
    textCell(id),
    numberCell(plan?.h, across),
    numberCell(plan?.v, across),
    numberCell(achieved?.h, across),
    numberCell(achieved?.v, across),
    numberCell(ratio, "0.00"),
    textCell(yesNo(agrees)),
  ]);
  const headings = ["Planned h", "Planned v", "Achieved h", "Achieved v"].map(
    (word) => `${word} (${offset})`,
  );
  return [
    ...section(
      "Confirmed",
      ["Station", ...headings, "Achieved over planned", "Agrees"],
      "No station was moved.",
      rows,
    ),
    [textCell("Reference stations repeat"), textCell(yesNo(result.reference.repeats))],
    [textCell("Moved unexpectedly"), textCell(result.unexpected.join(", ") || "none")],
    [textCell("To be measured still"), textCell(result.outstanding.join(", ") || "none")],
  ];
}

const yesNo = (answer: boolean | null): string => (answer === null ? "not shown" : answer ? "yes" : "no");
