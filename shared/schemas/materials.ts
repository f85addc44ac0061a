import { z } from "zod";

export const materialNames = [
  "steel_1020",
  "steel_1040",
  "steel_4140",
  "steel_4340",
  "stainless_304",
  "stainless_316",
  "stainless_405",
  "stainless_440a",
  "stainless_17_7ph",
  "grey_iron_g3000",
  "ductile_iron_60_40_18",
  "ductile_iron_80_55_06",
  "nickel_718",
] as const;

/** The engine's own table in words; a test of the engine holds the two together. */
export const materialTable = `| material | density, kg/m³ | modulus, GPa | expansion, 10⁻⁶/K |
|---|---|---|---|
| steel_1020 | 7850 | 207 | 11.7 |
| steel_1040 | 7850 | 207 | 11.3 |
| steel_4140 | 7850 | 207 | 12.3 |
| steel_4340 | 7850 | 207 | 12.3 |
| stainless_304 | 8000 | 193 | 17.2 |
| stainless_316 | 8000 | 193 | 15.9 |
| stainless_405 | 7800 | 200 | 10.8 |
| stainless_440a | 7800 | 200 | 10.2 |
| stainless_17_7ph | 7650 | 204 | 11 |
| grey_iron_g3000 | 7300 | state it | 11.4 |
| ductile_iron_60_40_18 | 7100 | 169 | 11.2 |
| ductile_iron_80_55_06 | 7100 | 168 | 10.6 |
| nickel_718 | 8190 | 200 | 13.2 |

Near room temperature, from W. D. Callister, Materials Science and Engineering: An Introduction, appendix B, tables B.1, B.2 and B.6; nickel_718 (UNS N07718) from Special Metals Corporation, publication SMC-045 (2007), tables 2, 3 and 5. A melt differs by some per cent, and a steel's expansion is a tenth larger at 400 °C: state your own where it matters.`;

export const materialSchema = z.enum(materialNames).meta({
  id: "Material",
  description: `Takes density, modulus and expansion from a table of published values.\n\n${materialTable}`,
});
