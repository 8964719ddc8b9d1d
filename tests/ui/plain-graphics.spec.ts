/** The section where the browser has no WebGL at all. */
import { expect, test } from "@playwright/test";
import { expectAccessible, nameState, openQuick } from "../helpers/quickPage.ts";
import { fieldColour } from "../helpers/sectionPage.ts";
import config from "../../playwright.config.ts";

const { launchOptions } = config.use!;
test.use({
  launchOptions: { ...launchOptions, args: [...(launchOptions?.args ?? []), "--disable-3d-apis"] },
});

test("the field is painted by a plain canvas, nothing breaks, and the caption says so", async ({ page }) => {
  const errors: string[] = [];
  page.on("pageerror", (error) => errors.push(error.message));
  page.on("console", (message) => message.type() === "error" && errors.push(message.text()));
  await nameState(page);
  await openQuick(page);
  await expect(page.getByText("Drawn without 3-D graphics: this browser has none.")).toBeVisible();
  const { expected, painted } = await fieldColour(page, 0.01, 0.04);
  for (let k = 0; k < 3; k++) expect(Math.abs(painted[k]! - expected[k]!)).toBeLessThanOrEqual(4);
  await expectAccessible(page, "corelag-section");
  expect(errors).toEqual([]);
});
