import { stationKinds } from "../../../shared/schemas/machines.ts";
import { unitChoices, furtherUnitChoices } from "../../../shared/units.ts";

/** What stands in a cell: `list` holds ids, `numbers` lengths, one a line or with semicolons between them. */
export type CellKind = "text" | "number" | "yes_no" | "choice" | "list" | "numbers";

/** What a number is measured in: a dimension of the machine's units, or a unit that never varies. */
export type CellUnit = "axial" | "bore" | "offset" | "slope" | "deg" | "rad";

/** One member of the document in a cell of its own. */
export interface Field {
  readonly heading: string;
  readonly kind: CellKind;
  /** Where the member stands in the sheet's item. */
  readonly path: readonly (string | number)[];
  readonly unit?: CellUnit;
  readonly required?: true;
  readonly note: string;
}

export interface TableSheet {
  readonly name: string;
  /** Where an item of it stands in the document. */
  readonly root: readonly (string | number)[];
  readonly what: string;
  readonly fields: readonly Field[];
}

const field = (
  heading: string,
  kind: CellKind,
  path: Field["path"],
  note: string,
  more: { readonly unit?: CellUnit; readonly required?: true } = {},
): Field => ({ heading, kind, path, note, ...more });

const required = { required: true } as const;
const axial = { unit: "axial" } as const;
const bore = { unit: "bore" } as const;
const offset = { unit: "offset" } as const;
const choose = (choices: readonly string[]): string => `One of ${choices.join(", ")}.`;
const plane = (heading: string, path: Field["path"], note: string) => [
  field(`${heading} h`, "number", [...path, "h"], note, offset),
  field(`${heading} v`, "number", [...path, "v"], note, offset),
];

/** The sheet of what there is once: one member a row. */
export const machineFields: readonly Field[] = [
  field("Name", "text", ["name"], "Of the machine.", required),
  field("Plant tag", "text", ["plantTag"], "What the plant's own documents call it."),
  field("Owner", "text", ["owner"], "Stands in the title block of reports."),
  field("Downstream", "text", ["downstream"], "The end that z increases toward, in words.", required),
  field(
    "Unit along the machine",
    "choice",
    ["units", "axial"],
    `${choose(unitChoices.axial)} The headings of all sheets state it too.`,
    required,
  ),
  field("Unit of bores", "choice", ["units", "bore"], choose(unitChoices.bore), required),
  field("Unit of offsets", "choice", ["units", "offset"], choose(unitChoices.offset), required),
  field(
    "Unit of temperatures",
    "choice",
    ["units", "temperature"],
    `${choose(furtherUnitChoices.temperature)} For readings at other temperatures than 20 °C.`,
  ),
  field("Reference stations", "list", ["reference"], "Ids of the stations that set the axis."),
  field("Maximum increment", "number", ["maximumIncrement"], "Largest part of a move made at once.", offset),
  field("Maximum misfit", "number", ["maximumMisfit"], "Most left between shims and the rigid move.", offset),
  field("Shims cut to multiples of", "number", ["shims", "cutToSize", "increment"], "", offset),
  field("Shims are used again", "yes_no", ["shims", "reuse"], "Whether pieces taken out go back to stock."),
  field("Remarks", "text", ["remarks"], "Free text."),
];

const stackFields: readonly Field[] = [
  field("Thickness", "number", ["stack", "thickness"], "As it stands; 0 holds no piece.", {
    ...offset,
    ...required,
  }),
  field("Least", "number", ["stack", "min"], "When done; 0 when empty.", offset),
  field("Most", "number", ["stack", "max"], "When done; unlimited when empty.", offset),
  field("Most pieces", "number", ["stack", "maxCount"], "In the finished stack; unlimited when empty."),
  field("Pieces", "numbers", ["stack", "shims"], "Thickness of each; not known when empty.", offset),
];

const clock = { unit: "deg" } as const;
const toleranceFields: readonly Field[] = [
  field("Tolerance radial", "number", ["tolerance", "radial"], "Half-width of a round one.", offset),
  ...(["h", "v"] as const).flatMap((side) => [
    field(`Tolerance ${side}`, "number", ["tolerance", side], "Half-width, or least and most.", offset),
    field(`Tolerance ${side} least`, "number", ["tolerance", side, 0], "Where one-sided.", offset),
    field(`Tolerance ${side} most`, "number", ["tolerance", side, 1], "Where one-sided.", offset),
  ]),
];

/** The sheets of what there is many of: one item a row. */
export const tableSheets = {
  stations: {
    name: "Stations",
    root: ["stations", 0],
    what: "The bores, one a row.",
    fields: [
      field("Id", "text", ["id"], "Your own name for it, once.", required),
      field("Label", "text", ["label"], "As people call it."),
      field("Kind", "choice", ["kind"], choose(stationKinds), required),
      field("z", "number", ["z"], "From one common face, increasing downstream.", { ...axial, ...required }),
      field("Nominal diameter", "number", ["nominalDiameter"], "On the drawing.", bore),
      ...plane("Target", ["target"], "Where the centre should lie; on the axis when empty."),
      ...plane("Target uncertainty", ["targetUncertainty"], "Standard (k = 1); exact when empty."),
      ...toleranceFields,
    ],
  },
  components: {
    name: "Components",
    root: ["components", 0],
    what: "The rigid parts that carry the bores.",
    fields: [
      field("Id", "text", ["id"], "Once.", required),
      field("Kind", "choice", ["kind"], choose(["casing", "shroud", "nozzle", "bearing", "other"])),
      field("Stations", "list", ["stations"], "Ids of the stations it carries."),
      field("Fixed", "yes_no", ["fixed"], "Whether it may not move."),
      field("Moves its reference station", "yes_no", ["allowReferenceMove"], "Whether it may."),
      field("Carried by", "text", ["carriedBy"], "Id of the component that it rests in."),
      field("Tilt tolerance h", "number", ["tilt", "tolerance", "h"], "Half-width.", { unit: "slope" }),
      field("Tilt tolerance v", "number", ["tilt", "tolerance", "v"], "Half-width.", { unit: "slope" }),
      field("Roll", "number", ["roll", "radians"], "As measured, clockwise looking downstream.", {
        unit: "rad",
      }),
    ],
  },
  supports: {
    name: "Supports",
    root: ["components", 0, "supports", 0],
    what: "What the components stand on.",
    fields: [
      field("Component", "text", ["component"], "Its id.", required),
      field("Id", "text", ["id"], "Once in its component.", required),
      field("Form", "choice", ["form"], choose(["feet", "pads", "joint_keys"]), required),
      field("z", "number", ["z"], "Of the support.", { ...axial, ...required }),
      field("Blocked", "list", ["blocked"], "h, v or both: where it cannot move."),
      ...(["h", "v"] as const).flatMap((side) => [
        field(
          `Travel ${side} least`,
          "number",
          ["travel", side, 0],
          "From now; unlimited when empty.",
          offset,
        ),
        field(
          `Travel ${side} most`,
          "number",
          ["travel", side, 1],
          "From now; unlimited when empty.",
          offset,
        ),
      ]),
      field("Keys", "choice", ["keys"], `Of feet. ${choose(["outside", "inside"])}`),
    ],
  },
  stacks: {
    name: "Stacks",
    root: ["components", 0, "supports", 0, "pads", 0],
    what: "The shim stacks of the supports, and their pads.",
    fields: [
      field("Component", "text", ["component"], "Its id.", required),
      field("Support", "text", ["support"], "Its id.", required),
      field(
        "Place",
        "text",
        ["place"],
        "left, right, key-left, key-right or key-bottom; of pads the pad's own id.",
        required,
      ),
      field("Clock", "number", ["clockDeg"], "Of a pad, clockwise from up, looking downstream.", clock),
      ...stackFields,
    ],
  },
  rollFeet: {
    name: "Roll feet",
    root: ["components", 0, "roll", "feet", 0],
    what: "Where the feet stand off the bore, of components with a roll.",
    fields: [
      field("Component", "text", ["component"], "Its id.", required),
      field("Support", "text", ["support"], "Its id.", required),
      field("Place", "text", ["place"], "Of the stack.", required),
      field("h", "number", ["h"], "From the bore's centre.", { ...offset, ...required }),
      field("v", "number", ["v"], "From the bore's centre.", { ...offset, ...required }),
    ],
  },
  stock: {
    name: "Stock",
    root: ["shims", "stock", 0],
    what: "Shims at hand.",
    fields: [
      field("Thickness", "number", ["thickness"], "Of one piece.", { ...offset, ...required }),
      field("Quantity", "number", ["quantity"], "Unlimited when empty."),
    ],
  },
  couplings: {
    name: "Couplings",
    root: ["couplings", 0],
    what: "How moving one component shifts another's station.",
    fields: [
      field("Component", "text", ["component"], "Its id.", required),
      field("Support", "text", ["support"], "Its id.", required),
      field("Station", "text", ["station"], "Its id.", required),
      field("h", "number", ["h"], "Shift per unit of the support's move.", required),
      field("v", "number", ["v"], "Shift per unit of the support's move.", required),
    ],
  },
  indicators: {
    name: "Indicators",
    root: ["indicators", 0],
    what: "Dial indicators that stay on during the moves.",
    fields: [
      field("Id", "text", ["id"], "Once.", required),
      field("Component", "text", ["component"], "Its id.", required),
      field("z", "number", ["z"], "Of the indicator.", { ...axial, ...required }),
      field("Clock", "number", ["clockDeg"], "Clockwise from up, looking downstream.", {
        ...clock,
        ...required,
      }),
      field("Contact", "choice", ["contact"], choose(["outside", "inside"])),
    ],
  },
  cautions: {
    name: "Cautions",
    root: ["cautions", 0],
    what: "The maker's own, shown with every plan and report.",
    fields: [field("Caution", "text", ["text"], "One a row.", required)],
  },
} as const satisfies Record<string, TableSheet>;

export type TableName = keyof typeof tableSheets;
export const tableNames = Object.keys(tableSheets) as TableName[];

export const machineSheet = { name: "Machine", headings: ["Field", "Value", "What it is"] } as const;
/** For people alone; never read. */
export const guideSheet = "Guide";
/** What the other sheets cannot tell from what is left out: null, and lists and texts with nothing in them. */
export const nothingSheet = { name: "Stated as nothing", headings: ["Place", "Value"] } as const;
