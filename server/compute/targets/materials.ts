/** What a material weighs, how stiff it is and how it grows, near room temperature. */
export interface Material {
  readonly densityKgPerM3: number;
  /** Null where the source gives a range too wide to stand for one casting. */
  readonly modulusGPa: number | null;
  /** Mean linear expansion, 1/K. */
  readonly expansionPerK: number;
  readonly source: string;
}

const handbook =
  "W. D. Callister, Materials Science and Engineering: An Introduction, appendix B, tables B.1, B.2 and B.6";
const datasheet = "Special Metals Corporation, publication SMC-045 (2007), tables 2, 3 and 5 (21 to 93 °C)";

const material = (
  densityKgPerM3: number,
  modulusGPa: number | null,
  perMillionKelvin: number,
  source = handbook,
): Material => ({ densityKgPerM3, modulusGPa, expansionPerK: perMillionKelvin / 1e6, source });

/**
 * Materials by name, each with its published source. Handbook values: a melt may differ by some per cent, and the
 * coefficient of a steel is a tenth larger at 400 °C than near room temperature (ASME BPVC section II part D, table TE-1).
 * The modulus of grey iron is given as 90 to 113 GPa by grade, so none stands here.
 */
export const materials = {
  steel_1020: material(7850, 207, 11.7),
  steel_1040: material(7850, 207, 11.3),
  steel_4140: material(7850, 207, 12.3),
  steel_4340: material(7850, 207, 12.3),
  stainless_304: material(8000, 193, 17.2),
  stainless_316: material(8000, 193, 15.9),
  stainless_405: material(7800, 200, 10.8),
  stainless_440a: material(7800, 200, 10.2),
  stainless_17_7ph: material(7650, 204, 11),
  grey_iron_g3000: material(7300, null, 11.4),
  ductile_iron_60_40_18: material(7100, 169, 11.2),
  ductile_iron_80_55_06: material(7100, 168, 10.6),
  nickel_718: material(8190, 200, 13.2, datasheet),
} as const satisfies Record<string, Material>;

export type MaterialName = keyof typeof materials;
