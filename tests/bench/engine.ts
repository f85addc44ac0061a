// Ratios of the engine to general-purpose libraries, measured beside each other: npm run bench
import { timeCircleFits } from "./circle-fits.ts";

timeCircleFits();
