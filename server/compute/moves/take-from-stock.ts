import { chooseForTasks, type TasksChoice } from "./choose-for-tasks.ts";
import { SearchBudget } from "./search-budget.ts";
import { piecesOf } from "./shim-changes.ts";
import type { ShimSupply } from "./shim-supply.ts";
import type { ShimChoice, ShimTask } from "./shim-task.ts";

/** The tasks of one component, in the order in which components are moved. */
export interface TasksOf {
  readonly index: number;
  readonly tasks: readonly ShimTask[];
}

/**
 * Chooses for a component with all of the stock that could be there when its turn comes. Where that takes more trials
 * than there are, its stacks have equal shares of the stock, and nothing is proved.
 * @throws ComputeError too_many_choices, not_converged
 */
export function chooseAlone(
  supply: ShimSupply,
  before: readonly TasksOf[],
  { index, tasks }: TasksOf,
  budget: SearchBudget,
): TasksChoice | null {
  const own: (TasksChoice | null)[] = [];
  const whole = () => {
    const could = tasks.map((task) => ({
      ...task,
      supply: couldHave(supply, before, { index, tasks }, task),
    }));
    own.push(chooseForTasks(could, budget));
  };
  if (budget.lasts(whole, () => supply.lines.length > 0)) return own[0] ?? null;
  const shared = chooseFromShares(tasks, supply.available);
  return shared && { ...shared, proved: false };
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

/**
 * Chooses for a component with what those before it leave. Where that takes more trials than there are, every stack has an
 * equal share of each line for itself: then nothing has to be counted over them, and the choice may be less good.
 */
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
    const own: (TasksChoice | null)[] = [];
    const whole = () => {
      const all = { ...task, supply: task.supply.with({ available: [...rest] }) };
      own.push(chooseForTasks([all], budget));
    };
    if (!budget.lasts(whole, () => true)) own.push(chooseFromShares([task], rest));
    const [choice] = own[0]?.choices ?? [];
    if (!choice) return null;
    take(choice);
    made.push(choice);
  }
  return made;
}

function chooseFromShares(tasks: readonly ShimTask[], rest: readonly number[]): TasksChoice | null {
  const stacks = tasks.reduce((sum, { loaded, following }) => sum + loaded.length + following.length, 0);
  const shares = rest.map((count) => Math.max(0, Math.floor(count / stacks)));
  const limited = tasks.map((task) => ({ ...task, supply: task.supply.limitedTo(shares) }));
  return chooseForTasks(limited, new SearchBudget());
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
