import js from "@eslint/js";
import hooks from "eslint-plugin-react-hooks";
import tseslint from "typescript-eslint";

/** Layers as lint: what each folder may import, so that the plan of the house is checked and not hoped for. */
const pureCompute = [
  {
    group: ["**/shared/**", "**/server/*", "**/routes/**", "**/services/**", "**/models/**"],
    message: "server/compute imports itself and numeric libraries only.",
  },
  {
    group: ["express", "sequelize", "mariadb", "zod", "zod/*", "node:*", "pino"],
    message: "server/compute is pure: no I/O, no schema, no platform.",
  },
];
const noNode = {
  group: ["node:*", "express", "sequelize", "**/server/**"],
  message: "shared/ and console/ run in the browser too.",
};

export default tseslint.config(
  { ignores: ["node_modules/**", "console/dist/**", ".data/**", "coverage/**"] },
  js.configs.recommended,
  ...tseslint.configs.recommendedTypeChecked,
  {
    languageOptions: {
      parserOptions: {
        project: ["./tsconfig.json", "./console/tsconfig.json"],
        tsconfigRootDir: process.cwd(),
      },
    },
    rules: {
      "max-lines": ["error", { max: 300, skipBlankLines: true, skipComments: true }],
      "no-restricted-exports": [
        "error",
        {
          restrictDefaultExports: {
            direct: true,
            named: true,
            defaultFrom: true,
            namedFrom: true,
            namespaceFrom: true,
          },
        },
      ],
      "@typescript-eslint/no-unused-vars": [
        "error",
        { argsIgnorePattern: "^_", varsIgnorePattern: "^_", ignoreRestSiblings: true },
      ],
      "@typescript-eslint/consistent-type-imports": "error",
      "@typescript-eslint/restrict-template-expressions": [
        "error",
        { allowNumber: true, allowBoolean: true },
      ],
      "@typescript-eslint/switch-exhaustiveness-check": [
        "error",
        { considerDefaultExhaustiveForUnions: true },
      ],
      eqeqeq: ["error", "always"],
    },
  },
  {
    files: ["server/compute/**/*.ts"],
    ignores: ["server/compute/**/*.test.ts"],
    rules: {
      "no-restricted-imports": ["error", { patterns: pureCompute }],
      "no-restricted-globals": ["error", "Date", "process", "performance", "console", "fetch", "setTimeout"],
      "no-restricted-properties": [
        "error",
        { object: "Math", property: "random", message: "Pass a seeded generator in." },
      ],
    },
  },
  {
    files: ["shared/**/*.ts"],
    ignores: ["shared/**/*.test.ts"],
    rules: { "no-restricted-imports": ["error", { patterns: [noNode] }] },
  },
  {
    files: ["console/src/**/*.{ts,tsx}"],
    plugins: { "react-hooks": hooks },
    rules: { ...hooks.configs.recommended.rules, "no-restricted-imports": ["error", { patterns: [noNode] }] },
  },
  {
    files: ["server/**/*.ts"],
    ignores: ["server/config.ts", "server/**/*.test.ts"],
    rules: {
      "no-restricted-properties": [
        "error",
        {
          object: "process",
          property: "env",
          message: "server/config.ts is the only reader of the environment.",
        },
        { object: "Math", property: "random", message: "Pass a generator in." },
      ],
    },
  },
  { files: ["**/*.{js,mjs}"], ...tseslint.configs.disableTypeChecked },
  {
    files: ["**/*.{js,mjs}"],
    languageOptions: {
      globals: {
        process: "readonly",
        console: "readonly",
        setTimeout: "readonly",
        clearTimeout: "readonly",
        setInterval: "readonly",
        clearInterval: "readonly",
        URL: "readonly",
        Buffer: "readonly",
        fetch: "readonly",
      },
    },
  },
  {
    // An answer's body comes from the HTTP client as any: a test says what it expects of it.
    files: ["tests/**/*.ts"],
    rules: {
      "@typescript-eslint/no-unsafe-assignment": "off",
      "@typescript-eslint/no-unsafe-member-access": "off",
      "@typescript-eslint/no-unsafe-argument": "off",
    },
  },
  // Tool configuration files must export by default: their tools ask for it.
  {
    files: [".config/*.js", "**/vite.config.ts", "**/vitest.config.ts"],
    rules: { "no-restricted-exports": "off" },
  },
);
