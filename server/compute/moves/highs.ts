import loadHighs from "highs";

/** The solver of linear and mixed-integer programs, loaded once for all that use it. */
export const highs = await loadHighs();
