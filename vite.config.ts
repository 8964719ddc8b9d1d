import { defineConfig } from "vitest/config";

export default defineConfig({
  base: "./",
  build: { outDir: "dist/page", target: "es2023", emptyOutDir: true, chunkSizeWarningLimit: 700 },
  worker: { format: "es" },
  server: { host: "127.0.0.1" },
  preview: { host: "127.0.0.1" },
  test: {
    include: ["tests/**/*.test.ts"],
    exclude: ["tests/ui/**"],
    environment: "node",
    testTimeout: 60_000,
  },
});
