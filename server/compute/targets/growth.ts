/** One reason for a bore to move between the survey's metal temperature and hot running. */
export interface Growth {
  readonly direction: "h" | "v";
  /** From the fixed support to the centre line, mm; negative where the support lies above, or to the right. */
  readonly lengthMm: number;
  /** Mean linear expansion, 1/K. */
  readonly expansionPerK: number;
  /** Hot less cold, K. */
  readonly riseK: number;
  /** Standard uncertainty of the growth, mm; null where none is stated. */
  readonly uncertaintyMm: number | null;
}

/** α·L·(T_hot − T_cold), mm. */
export function growthMm({ expansionPerK, lengthMm, riseK }: Growth): number {
  return expansionPerK * lengthMm * riseK;
}
