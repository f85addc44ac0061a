import type { MachineDocument } from "../../../shared/schemas/machines.ts";
import type { Item, Json } from "./nested.ts";
import { tableNames, type TableName } from "./layout.ts";

/** The rows of every table sheet. */
export type Tables = Readonly<Record<TableName, readonly Item[]>>;

/** A document taken apart into rows, in the order of the document. */
export function tablesOf(document: MachineDocument): Tables {
  const { stations, components = [], couplings = [], indicators = [], shims, cautions = [] } = document;
  const supports = components.flatMap(({ id, supports: own = [] }) =>
    own.map((support) => ({ component: id, support })),
  );
  const tables = {
    stations,
    components: components.map(({ supports: _elsewhere, roll, ...component }) => ({
      ...component,
      ...(roll ? { roll: { radians: roll.radians } } : {}),
    })),
    supports: supports.map(({ component, support }) => {
      const { form, ...rest } = support;
      const { id, z, blocked, travel } = rest;
      return { component, id, form, z, blocked, travel, ...("keys" in rest ? { keys: rest.keys } : {}) };
    }),
    stacks: supports.flatMap(({ component, support }) =>
      support.form === "pads"
        ? support.pads.map(({ id, clockDeg, stack }) => ({
            component,
            support: support.id,
            place: id,
            clockDeg,
            stack,
          }))
        : Object.entries(support.stacks ?? {}).map(([place, stack]) => ({
            component,
            support: support.id,
            place,
            stack,
          })),
    ),
    rollFeet: components.flatMap(({ id, roll }) =>
      (roll?.feet ?? []).map((foot) => ({ component: id, ...foot })),
    ),
    stock: shims?.stock ?? [],
    couplings,
    indicators,
    cautions: cautions.map((text) => ({ text })),
  } satisfies Record<TableName, readonly object[]>;
  return Object.fromEntries(
    tableNames.map((name) => [name, JSON.parse(JSON.stringify(tables[name])) as Json]),
  ) as unknown as Tables;
}
