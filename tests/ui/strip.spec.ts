import { expect, test } from "@playwright/test";
import {
  cursorOf,
  documentOf,
  expectAccessible,
  middleOf,
  nameState,
  openQuick,
  settle,
} from "../helpers/quickPage.ts";

test.beforeEach(async ({ page }) => {
  await nameState(page);
  await openQuick(page);
});

test("the strip is accessible, as a chart and as a table", async ({ page }) => {
  await expectAccessible(page, "corelag-strip");
  await page.getByRole("button", { name: "Show the curves as a table" }).click();
  await expect(page.getByRole("columnheader", { name: "one temperature" })).toBeVisible();
  await expect(page.getByRole("rowheader", { name: /end of Oil/ })).toBeVisible();
  await expectAccessible(page, "corelag-strip");
});

test("the treatment and the cursor say what they show", async ({ page }) => {
  await expect(page.getByRole("group", { name: "Treatment: Oil, 60 °C for 10 min" })).toBeVisible();
  await page.evaluate(() => (appState().cursor.value = 120));
  const time = page.getByRole("slider", { name: "Time", exact: true });
  await expect(time).toHaveAttribute("aria-valuetext", /^120(\.0)? s\. Core \d+, mean \d+, skin \d+ °C\.$/);
});

test("arrow keys move the cursor by graduations, Home and End to the ends", async ({ page }) => {
  await page.evaluate(() => (appState().cursor.value = 0));
  const time = page.getByRole("slider", { name: "Time", exact: true });
  await time.focus();
  await time.press("ArrowRight");
  const step = await cursorOf(page);
  expect(step).toBeGreaterThan(0);
  await time.press("Shift+ArrowRight");
  expect(await cursorOf(page)).toBeCloseTo(10 * step, 6);
  await time.press("End");
  expect(await cursorOf(page)).toBeCloseTo(600, 6);
  await time.press("Home");
  expect(await cursorOf(page)).toBe(0);
  await time.press("]");
  expect(await cursorOf(page)).toBeCloseTo(600, 6);
});

test("a drag anywhere in the plot moves the time", async ({ page }) => {
  const chart = await page.getByRole("group", { name: /^Treatment:/ }).boundingBox();
  const y = chart!.y + chart!.height / 2;
  await page.mouse.move(chart!.x + chart!.width * 0.3, y);
  await page.mouse.down();
  const first = await cursorOf(page);
  await page.mouse.move(chart!.x + chart!.width * 0.5, y, { steps: 4 });
  await page.mouse.up();
  expect(await cursorOf(page)).toBeGreaterThan(first + 60);
  expect((await documentOf(page)).stages[0]?.lasts).toBe("600 s");
});

test("surroundings move by key and by pointer, one step of undo each", async ({ page }) => {
  const knob = page.getByRole("slider", { name: "Oil, surroundings" });
  await knob.focus();
  await knob.press("ArrowUp");
  await knob.press("Shift+ArrowUp");
  expect((await documentOf(page)).stages[0]?.ambient).toBe("71 degC");
  const at = await middleOf(knob);
  await page.mouse.move(at.x, at.y);
  await page.mouse.down();
  await page.mouse.move(at.x, at.y - 40, { steps: 5 });
  await page.mouse.up();
  const dragged = (await documentOf(page)).stages[0]?.ambient;
  expect(Number.parseFloat(String(dragged))).toBeGreaterThan(100);
  await page.keyboard.press("Control+z");
  expect((await documentOf(page)).stages[0]?.ambient).toBe("71 degC");
});

test("Esc while dragging puts the surroundings back", async ({ page }) => {
  const at = await middleOf(page.getByRole("slider", { name: "Oil, surroundings" }));
  await page.mouse.move(at.x, at.y);
  await page.mouse.down();
  await page.mouse.move(at.x, at.y - 40, { steps: 5 });
  await page.keyboard.press("Escape");
  await page.mouse.up();
  expect((await documentOf(page)).stages[0]?.ambient).toBe("60 degC");
});

test("the end of a stage moves by key, and a further stage can be added", async ({ page }) => {
  const end = page.getByRole("slider", { name: "End of Oil" });
  await end.focus();
  await end.press("ArrowRight");
  const lasts = String((await documentOf(page)).stages[0]?.lasts);
  expect(lasts).toBe("610 s");
  await page.getByRole("button", { name: "Add a stage" }).click();
  await settle(page);
  expect((await documentOf(page)).stages).toHaveLength(2);
  await expect(page.getByRole("group", { name: /^Treatment: Oil,.*; Stage 2,/ })).toBeVisible();
});

test("Space plays and stops", async ({ page }) => {
  await page.evaluate(() => (appState().cursor.value = 0));
  const time = page.getByRole("slider", { name: "Time", exact: true });
  await time.focus();
  await time.press(" ");
  await expect.poll(() => cursorOf(page)).toBeGreaterThan(5);
  await time.press(" ");
  await expect(page.getByRole("button", { name: "Play through the treatment" })).toBeVisible();
  const stopped = await cursorOf(page);
  await page.waitForTimeout(150);
  expect(await cursorOf(page)).toBe(stopped);
});

test("before there is a part the strip says what will lie there", async ({ page }) => {
  await page.evaluate(() => (appState() as unknown as { clear(): void }).clear());
  await expect(page.getByText("Then say what is done to it")).toBeVisible();
});
