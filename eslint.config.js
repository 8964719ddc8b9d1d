import js from "@eslint/js";
import { configs as lit } from "eslint-plugin-lit";
import ts from "typescript-eslint";

export default ts.config(
  { ignores: ["dist/", "**/generated/", "coverage/", "test-results/", "src/linalg/kernels/assembly/"] },
  js.configs.recommended,
  ...ts.configs.strict,
  lit["flat/recommended"],
  {
    rules: {
      // Numerics index typed arrays whose bounds the loop already guards, and closures over known values.
      "@typescript-eslint/no-non-null-assertion": "off",
      "@typescript-eslint/consistent-type-imports": "error",
      "no-console": "error",
      eqeqeq: "error",
      "prefer-const": "error",
    },
  },
  {
    files: ["tools/**", "src/cli/**", "tests/bench/**"],
    languageOptions: {
      globals: {
        console: "readonly",
        process: "readonly",
        performance: "readonly",
        setTimeout: "readonly",
        URL: "readonly",
        fetch: "readonly",
      },
    },
    rules: { "no-console": "off" },
  },
);
