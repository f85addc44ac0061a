// Ratios of the engine to general-purpose libraries, measured beside each other: npm run bench
import { timeCircleFits } from "./circle-fits.ts";
import { timeLoopLag, timeWholeChain } from "./whole-chain.ts";

timeCircleFits();
timeWholeChain();
await timeLoopLag();
