import { render, screen } from "@testing-library/react";
import { describe, expect, it } from "vitest";
import { shimMoveResponse, type ShimMoveResult } from "../../../../../shared/schemas/shim-moves.ts";
import { moveRequest, sampleResponse } from "../../../testing/sample-records.ts";
import { MoveSheet } from "./move-sheet.tsx";

function show(search: ShimMoveResult["search"]) {
  const { result } = shimMoveResponse.parse(sampleResponse("shim-move"));
  return render(<MoveSheet call={moveRequest} result={search ? { ...result, search } : result} />);
}

describe("the move sheet", () => {
  it("says how the shims were chosen, and that no better choice exists where that is proved", () => {
    show({ method: "enumeration", proved: true, gap: 0 });
    expect(screen.getByText(/^Shims were chosen for/).textContent).toBe(
      "Shims were chosen for all components together, for the stock they share: no better choice exists.",
    );
  });

  it("says by how much a better choice could be better, or that this is not known", () => {
    const { unmount } = show({ method: "mixed_integer_program", proved: false, gap: 0.012345 });
    expect(screen.getByText(/^Shims were chosen for/).textContent).toContain("may exist, by 0.0123 at most");
    unmount();
    show({ method: "in_turn", proved: false, gap: null });
    expect(screen.getByText(/^Shims were chosen for/).textContent).toMatch(
      /those before it leave: a better choice may exist\.$/,
    );
  });

  it("says nothing of a choice where none was made", () => {
    show(undefined);
    expect(screen.queryByText(/^Shims were chosen for/)).toBeNull();
  });
});
