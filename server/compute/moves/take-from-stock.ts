import { chooseForTasks, type TasksChoice } from "./choose-for-tasks.ts";
import type { SearchBudget } from "./search-budget.ts";
import { piecesOf } from "./shim-changes.ts";
import type { ShimSupply } from "./shim-supply.ts";
import type { ShimChoice, ShimTask } from "./shim-task.ts";

/** The tasks of one component, in the order in which components are moved. */
export interface TasksOf {
  readonly index: number;
  readonly tasks: readonly ShimTask[];
}

/** Chooses for a component with all of the stock that could be there when its turn comes. */
export function chooseAlone(
  supply: ShimSupply,
  before: readonly TasksOf[],
  { index, tasks }: TasksOf,
  budget: SearchBudget,
): TasksChoice | null {
  return chooseForTasks(
    tasks.map((task) => ({ ...task, supply: couldHave(supply, before, { index, tasks }, task) })),
    budget,
  );
}

/** Lines of which the choices of components, made in this order, take more than there is at some point. */
export function overdrawnBy(
  supply: ShimSupply,
  inOrder: readonly (readonly ShimChoice[] | null)[],
): number[] {
  const over = new Set<number>();
  const net = supply.lines.map(() => 0);
  for (const choices of inOrder) {
    for (const choice of choices ?? []) {
      for (const line of net.keys()) net[line] = (net[line] ?? 0) + (choice.net[line] ?? 0);
    }
    for (const line of supply.overdrawn(net)) over.add(line);
  }
  return [...over].sort((a, b) => a - b);
}

/** Chooses for a component with what those before it leave. */
export function chooseFromRest(
  supply: ShimSupply,
  before: readonly (readonly ShimChoice[] | null)[],
  { tasks }: TasksOf,
  budget: SearchBudget,
): readonly ShimChoice[] | null {
  const rest = [...supply.available];
  const take = ({ net }: ShimChoice) => {
    for (const line of rest.keys()) rest[line] = (rest[line] ?? 0) - (net[line] ?? 0);
  };
  for (const choices of before) choices?.forEach(take);
  const made: ShimChoice[] = [];
  for (const task of tasks) {
    const own = chooseForTasks([{ ...task, supply: task.supply.with({ available: [...rest] }) }], budget);
    const [choice] = own?.choices ?? [];
    if (!choice) return null;
    take(choice);
    made.push(choice);
  }
  return made;
}

/** The stock that could be there for a task at best: all of it, and what is given back before its turn or beside it. */
export function couldHave(
  supply: ShimSupply,
  before: readonly TasksOf[],
  own: TasksOf,
  task: ShimTask,
): ShimSupply {
  if (!supply.reuse) return supply;
  const others = [...before.flatMap(({ tasks }) => tasks), ...own.tasks.filter((each) => each !== task)];
  const available = [...supply.available];
  for (const { loaded, following } of others) {
    for (const { place } of [...loaded, ...following]) {
      for (const mm of piecesOf(place.stack)) {
        const line = supply.lineOf(mm);
        if (line >= 0) available[line] = (available[line] ?? 0) + 1;
      }
    }
  }
  return supply.with({ available });
}
