import { expect, test } from "@playwright/test";
import type { Page } from "@playwright/test";
import {
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

const asks = async (page: Page): Promise<string[]> =>
  ((await documentOf(page)).questions ?? []).map(({ ask }) => ask);

test("answers are accessible and named by their whole question", async ({ page }) => {
  const first = page.getByRole("article", { name: "Question 1: When has every point fallen to 300 °C?" });
  await expect(first).toContainText(/\d\s+s/);
  await expect(first).toContainText("one temperature");
  await expectAccessible(page, "corelag-pane");
});

test("a limit is typed in any unit and answered anew", async ({ page }) => {
  const first = page.getByRole("article").first();
  const before = await first.locator("output").textContent();
  const limit = page.getByRole("textbox", { name: "limit, question 1" });
  await limit.fill("400 degF");
  await limit.press("Enter");
  await settle(page);
  expect((await documentOf(page)).questions?.[0]).toMatchObject({ reaches: "400 degF" });
  await expect(limit).toHaveValue(/^204\.4\s°C$/);
  await expect(first.locator("output")).not.toHaveText(before ?? "");
});

test("arrow keys step a limit as one step of undo", async ({ page }) => {
  const limit = page.getByRole("textbox", { name: "limit, question 1" });
  await limit.focus();
  await limit.press("ArrowUp");
  expect((await documentOf(page)).questions?.[0]).toMatchObject({ reaches: "301 °C" });
  await limit.blur();
  await page.keyboard.press("Control+z");
  expect((await documentOf(page)).questions?.[0]).toMatchObject({ reaches: "300 degC" });
});

test("what is no temperature stays in the field with its mend, and Esc puts it back", async ({ page }) => {
  const limit = page.getByRole("textbox", { name: "limit, question 1" });
  await limit.fill("3 mm");
  await limit.press("Enter");
  await expect(page.getByRole("alert")).toContainText("a temperature is expected");
  expect((await documentOf(page)).questions?.[0]).toMatchObject({ reaches: "300 degC" });
  await limit.press("Escape");
  await expect(page.getByRole("alert")).toHaveCount(0);
  await expect(limit).toHaveValue(/^300\s°C$/);
});

test("the place is chosen with the keyboard", async ({ page }) => {
  const place = page.getByRole("combobox", { name: /^place, question 1/ });
  await place.focus();
  await place.press("Enter");
  await expect(page.getByRole("option", { name: /every point/ })).toBeVisible();
  await page.keyboard.press("m");
  await page.keyboard.press("Enter");
  expect((await documentOf(page)).questions?.[0]).toMatchObject({ where: "middle" });
  await expect(place).toBeFocused();
});

test("questions are added, moved and taken out by keyboard", async ({ page }) => {
  await page.getByRole("button", { name: "Ask something else" }).click();
  await page.getByRole("menuitem", { name: /How hot is it then/ }).click();
  expect(await asks(page)).toEqual(["when", "spread", "heat", "reading"]);
  await expect(page.getByRole("article").nth(3)).toBeFocused();
  await page.keyboard.press("Alt+ArrowUp");
  expect(await asks(page)).toEqual(["when", "spread", "reading", "heat"]);
  await expect(page.getByRole("article").nth(2)).toBeFocused();
  await page.keyboard.press("Delete");
  expect(await asks(page)).toEqual(["when", "spread", "heat"]);
});

test("a question is moved with the pointer by its balloon", async ({ page }) => {
  const from = await middleOf(page.getByRole("article").first().locator(".ball"));
  const to = await middleOf(page.getByRole("article").nth(1));
  await page.mouse.move(from.x, from.y);
  await page.mouse.down();
  await page.mouse.move(from.x, to.y + 10, { steps: 5 });
  await page.mouse.up();
  expect(await asks(page)).toEqual(["spread", "when", "heat"]);
});

test("the answer in focus lights its balloon, and A shows its arrival", async ({ page }) => {
  const first = page.getByRole("article").first();
  await first.focus();
  await expect(page.locator("corelag-strip circle.ball.lit")).toHaveCount(1);
  await page.keyboard.press("a");
  await expect(page.locator("corelag-strip rect.paint")).toHaveAttribute("height", "9");
  await page.keyboard.press("a");
  await expect(page.locator("corelag-strip rect.paint")).toHaveAttribute("width", "10");
});

test("faults keep the old answers, marked, and say how to mend", async ({ page }) => {
  const shown = await page.getByRole("article").first().locator("output").textContent();
  await page.evaluate(() => {
    const state = appState() as unknown as { edit(label: string, recipe: (draft: never) => void): void };
    state.edit("density", (draft: { materials: { steel: { density: number } } }) => {
      draft.materials.steel.density = -1;
    });
  });
  await expect(page.getByRole("heading", { name: "From the case before the last change" })).toBeVisible();
  await expect(page.getByRole("alert")).toContainText("density");
  await expect(page.getByRole("article").first().locator("output")).toHaveText(shown ?? "");
  await expectAccessible(page, "corelag-pane");
});
