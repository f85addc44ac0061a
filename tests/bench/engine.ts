// Ratios of the engine to general-purpose libraries, measured beside each other: npm run bench
import { timeBestAxes } from "./best-axes.ts";
import { timeCircleFits } from "./circle-fits.ts";
import { timeNarrowestZones } from "./narrowest-zones.ts";
import { timeSharedStock, timeStockChoice } from "./shims-from-stock.ts";
import { timeLoopLag, timeWholeChain } from "./whole-chain.ts";

timeCircleFits();
timeNarrowestZones();
timeBestAxes();
timeStockChoice();
timeSharedStock();
timeWholeChain();
await timeLoopLag();
