import type { MoveComponent } from "./move-problem.ts";

/**
 * Indices of the components in the order in which they are solved and moved (common practice, no source): casings,
 * shrouds, nozzles and other parts to the axis first, bearings after, each in the order sent; what carries another
 * before what it carries.
 */
export function solvingOrder(components: readonly MoveComponent[]): number[] {
  const indices = [...components.keys()];
  const isBearing = (index: number) => components[index]?.kind === "bearing";
  const wanted = [...indices.filter((index) => !isBearing(index)), ...indices.filter(isBearing)];
  const order: number[] = [];
  for (const index of wanted) {
    const carriersFirst = [index, ...carriersOf(components, index)].reverse();
    order.push(...carriersFirst.filter((each) => !order.includes(each)));
  }
  return order;
}

/** The component that carries this one, what carries that, and so on: nearest first. A ring is left where it closes. */
export function carriersOf(components: readonly MoveComponent[], index: number): number[] {
  const carriers: number[] = [];
  for (let at = index; ;) {
    const id = components[at]?.carriedById;
    at = typeof id === "string" ? components.findIndex((component) => component.id === id) : -1;
    if (at < 0 || at === index || carriers.includes(at)) return carriers;
    carriers.push(at);
  }
}
