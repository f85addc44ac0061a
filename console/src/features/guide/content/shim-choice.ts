import { commonPractice, ownRule, type Method } from "../method.ts";

/** From the ideal move to real shims. */
export const shimChoice: readonly Method[] = [
  {
    id: "stack-changes",
    title: "What a move changes",
    asked: "form: feet | pads | joint_keys",
    says: [
      "Feet left and right by +v; side keys outside the feet by +h at the left and −h at the right, inside them swapped. Without key stacks h is set by jack and locked. Joint keys carry the height at left and right; the bottom key sets the side by its cheeks.",
      "Pads by their clock angle. Straight up by v on lower pads at 135° and 225° is +v·cos 45° each. Pads from 90° to 270° bear load; upper pads follow the realised move. After shimming a bearing: cap crush, top clearance, journal contact, coupling rim and face.",
    ],
    formulas: ["pad: change = −(h · sin(clockDeg) + v · cos(clockDeg))"],
    where: [["h, v", "move of the bore at the support"]],
    sources: [commonPractice],
  },
  {
    id: "realised-move",
    title: "Realised move and misfit",
    asked: "maximumMisfit",
    says: [
      "Real shims on more places than a rigid part can follow do not make the ideal move. The realised move is the rigid one that best fits the chosen changes at load-bearing places; what is left at a place is its misfit, at most 0.02 mm unless stated. Predictions and verdicts are those of the realised move.",
    ],
    formulas: [
      "minimise Σ (change_j − change that m asks at j)²",
      "misfit_j = change_j − change that m asks at j",
    ],
    where: [["m", "a rigid move"]],
    sources: [ownRule],
  },
  {
    id: "choosing",
    title: "Choosing shims together",
    asked: "shims: {cutToSize: {increment}, stock}",
    says: [
      "Shims for all stacks of a component are chosen together. Every choice that could be better than the best found is visited or excluded: the search goes through an ellipsoid about the best move imaginable, widened until it reaches to the best found, and it is bounded by a budget with a code of its own, `too_many_choices`.",
      "Costs within 1e-9·(1 + the smaller) are equal; then fewest pieces handled, then least total change, then stock order. A pack whose pieces are not known is one piece: kept and added to, or taken out whole. Twin feet and keys are changed alike. Without `shims` every change is the ideal one, and the answer says `shims_not_chosen`.",
    ],
    formulas: ["minimise Σ w_i · (d_i + m(z_i))² over the choices of shims"],
    where: [["m", "the realised move of a choice"]],
    sources: ["U. Fincke and M. Pohst, Mathematics of Computation 44 (1985) 463–471, from memory"],
  },
  {
    id: "stock",
    title: "Shims from a stock",
    asked: "shims: {stock: [{thickness, quantity}], reuse}",
    says: [
      "Thicknesses at hand, with quantities where they matter, alone or beside shims cut to size. Shared stock is never overdrawn; pieces taken out go back to it only with `reuse`, for the same component and those moved after it.",
      "First each component is served by itself with all of the stock: where that overdraws nothing it is the best there is. Else all are chosen together, by enumeration or by a mixed-integer program. Where one component's move shifts another's stations and stock is short, each takes its turn. `search` says which, whether the choice is proved, and by how much a better one could be better; what is not proved is advice, `optimality_not_proved`.",
    ],
    formulas: ["pieces taken of a thickness ≤ quantity + given back"],
    where: [],
    sources: ["G. B. Dantzig and P. Wolfe, Operations Research 8 (1960) 101–111, from memory"],
  },
  {
    id: "predicted",
    title: "Predicted as left",
    asked: null,
    says: [
      "Every station as the shims chosen leave it, from the axis as surveyed. Guarded where the station's covariance is known, since a move adds nothing to it; else the simple verdict.",
    ],
    formulas: ["predicted_i = d_i + m(z_i)"],
    where: [],
    sources: [ownRule],
  },
];
