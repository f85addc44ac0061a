import { commonPractice, ownRule, type Method } from "../method.ts";

/** The ideal move of a rigid part, and what ties parts to each other. */
export const moveSolving: readonly Method[] = [
  {
    id: "rigid-move",
    title: "Rigid move",
    asked: "components",
    says: [
      "A component is rigid: it shifts and tilts in each plane. Supports all at one z give no tilt, a direction blocked at one z only lets it turn about that z. After the move each station has its deviation plus m at its z.",
      "Of moves that serve the stations alike, the one that moves the supports least is taken.",
    ],
    formulas: ["m(z) = m_0 + t · (z − z_m)", "minimise Σ w_i · (d_i + m(z_i))²,   w_i = 1/T_i²"],
    where: [
      ["m_0, t", "shift and tilt, in h and in v"],
      ["z_m", "mean z of the supports"],
      [
        "d_i, T_i",
        "deviation and tolerance half-width of a station; without a tolerance it asks for nothing",
      ],
    ],
    sources: [ownRule],
  },
  {
    id: "minimax",
    title: "The largest deviation instead of the sum",
    asked: "objective: minimax",
    says: [
      "The largest share of a tolerance is made least: by the radial deviation where the tolerance is round, by h and v apart where it is stated in planes. Round tolerances are approached by tangents until the rounds converge as Newton's method does; each round is a quadratic program solved exactly. The end is proved by duality: with the multipliers as weights no move has a smaller largest share.",
    ],
    formulas: ["minimise max |d_i + m(z_i)| / T_i"],
    where: [],
    sources: ["J. Nocedal and S. Wright, Numerical Optimization, 2nd ed. 2006, chapter 18, from memory"],
  },
  {
    id: "limits",
    title: "Limits",
    asked: "travel, blocked, stack min and max",
    says: [
      "Travel at each support, blocked directions and the least and most thickness of each stack are kept. The problem is a convex quadratic program of few unknowns, solved exactly by an incremental method; before answering, the optimality conditions are verified by another algorithm. What cannot be reached is answered with its reason and a pointer to the limit that binds.",
    ],
    formulas: ["limits: a_j · x ≤ b_j"],
    where: [["x", "the move's unknowns"]],
    sources: [
      "R. Seidel, Small-dimensional linear programming and convex hulls made easy, Discrete & Computational Geometry 6 (1991) 423–434, from memory",
      "C. L. Lawson and R. J. Hanson, Solving Least Squares Problems (1974), chapter 23, algorithm NNLS",
    ],
  },
  {
    id: "linked-parts",
    title: "Carried parts and couplings",
    asked: "carriedBy, couplings",
    says: [
      "A part carried by another has its stations moved with that one before its own move is solved. A coupling states how moving one component shifts another's station. What is shifted after it was served is told as advice.",
      "Deviations and predictions are from the axis as surveyed, fixed in space. A component that holds a reference station stays, unless `allowReferenceMove` is true; then the answer says that the axis must be surveyed anew.",
    ],
    formulas: ["shift of the station = coupling × move of the support, in h and in v"],
    where: [],
    sources: [ownRule],
  },
  {
    id: "tilt",
    title: "Tilt of a bearing",
    asked: "tilt: {tolerance: {h, v}}",
    says: [
      "The slope of the line through a part's two end stations has a tolerance of its own. It pulls on the move as a station does. Where the supports cannot make a tilt, the answer says `tilt_not_adjustable`: it is never turned into a translation.",
    ],
    formulas: ["adds (s + t)² / S²"],
    where: [
      ["s, t", "slope found, and tilt of the move"],
      ["S", "its tolerance, offset per axial unit"],
    ],
    sources: [ownRule],
  },
  {
    id: "roll",
    title: "Roll",
    asked: "roll: {radians, feet}",
    says: [
      "Clockwise positive, seen downstream. A measured roll is taken out by differences between the feet; the bore stands above them and moves sideways while that is done, and the stations are served from where that leaves them. Indicators point at the bore and read its move. Without a roll both feet are changed alike, so that it is kept.",
    ],
    formulas: ["foot at h: +h · roll", "bore: roll · height, toward −h for a clockwise roll"],
    where: [["h", "of the foot from the bore's centre, small angles"]],
    sources: [ownRule],
  },
  {
    id: "order",
    title: "Order and steps",
    asked: "maximumIncrement, indicators",
    says: [
      "Casing sections and shrouds to the axis first, bearings to the axis after, each locked before the next; what carries another before what it carries. In each part h is done before v, bolts loose, then at torque before an indicator is read.",
      "A step is split into equal parts, cumulative from the component's start, each with what every indicator should read and the neighbours to watch. Afterwards: the reference stations first, then every station that moved.",
    ],
    formulas: ["parts = ⌈L / maximumIncrement⌉", "stop at change ± maximumMisfit"],
    where: [["L", "largest |h| or |v| at any support"]],
    sources: [commonPractice],
  },
];
