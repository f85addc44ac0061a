/** Raised whenever a numeric result changes; what changed and by how much stands in CHANGELOG.md beside this file. */
export const engineVersion = "1.0.0";
