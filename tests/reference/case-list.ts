/** Cases that the service cannot express, by id, each with the reason. `describeCases` passes over them everywhere. */
export const notExpressed: Readonly<Record<string, string>> = {
  "circle-gander-1994-algebraic":
    "Algebraic circles (Kåsa, Pratt, Taubin) are no method of the service: their centres shrink toward the arc. Taubin's, where the fit starts, is held beside the engine.",
  "gum-h1-end-gauge":
    "A model of seven quantities of the caller's own: the service propagates through bores, axes, targets and moves only. Its degrees of freedom are held by the tests of Welch–Satterthwaite.",
  "l1-nag-e02ga": "Three unknowns (exponentials); an axis has two in each plane.",
  "l1-stackloss": "Four unknowns; an axis has two in each plane.",
  "line-nist-l2-lin2d01":
    "Distances square to the line: an axis takes z as exact and measures in h and v, across the machine.",
  "line-nist-l2-lin2d02":
    "Distances square to the line: an axis takes z as exact and measures in h and v, across the machine.",
  "line-nist-l2-lin2d16":
    "Distances square to the line: an axis takes z as exact and measures in h and v, across the machine.",
  "line-pearson-york-both-weighted": "Errors in both coordinates: an axis takes z as exact.",
  "nist-strd-noint1": "A line through the origin: an axis has a height of its own.",
  "nist-strd-pontius": "A polynomial of degree 2: an axis is straight.",
  "nist-strd-wampler1": "A polynomial of degree 5: an axis is straight.",
  "nist-strd-wampler2": "A polynomial of degree 5: an axis is straight.",
  "nist-strd-wampler3": "A polynomial of degree 5: an axis is straight.",
  "nist-strd-wampler5": "A polynomial of degree 5: an axis is straight.",
  "robust-belgian-telephone":
    "Least median of squares and Huber's weights are no method of an axis, and the L1 line of these data is not the only one.",
  "robust-cushny": "Trimmed means and medians: repeated readings are answered by their mean, none left out.",
  "robust-huber-small-sets": "Huber's estimate of location: repeated readings are answered by their mean.",
};

/** Cases that no request can state, though the engine computes them: held directly alone, each with the reason. */
export const notOverHttp: Readonly<Record<string, string>> = {
  "bounded-lsqlin-equality":
    "Four unknowns with dense limits: a component's move has two in each plane, its limits those of supports. The program that solves moves is held to it.",
};
