import tailwindcss from "@tailwindcss/vite";
import react from "@vitejs/plugin-react";
import { defineConfig } from "vite";

/** Files only, nothing inline: the server's content security policy takes scripts, styles and fonts from itself. */
export default defineConfig({
  root: import.meta.dirname,
  base: "/",
  plugins: [react(), tailwindcss()],
  build: {
    outDir: "dist",
    emptyOutDir: true,
    sourcemap: false,
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
    // The schema library with our setting of it, in one chunk: set before any other chunk makes a schema.
    rolldownOptions: {
      output: {
        codeSplitting: { groups: [{ name: "schemas", test: /node_modules\/zod\/|lib\/without-eval\.ts$/ }] },
      },
    },
  },
});
