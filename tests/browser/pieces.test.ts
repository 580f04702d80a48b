import type { BrowserContextOptions, Page } from "playwright-core";
import { describe, expect, it } from "vitest";
import { expectAccessible, useBrowser } from "../support/browser.ts";
import { useServer } from "../support/server.ts";

/*
 * The pieces that all pages are made of, on the page that shows each in all its states: what holds here holds wherever
 * they are used.
 */
const server = useServer({ env: { SPECIMENS: "on" } });
const browser = useBrowser();

/** Pages that anybody may read, signed in or not. */
const CONVENTIONS = [
  "/conventions",
  "/conventions/symbols",
  "/conventions/states",
  "/conventions/units",
  "/conventions/uncertainty",
  "/conventions/spellings",
  "/conventions/checks",
  "/conventions/checks/gibbs-closure",
];

/** Another window on the same browser, of another size or without scripts. */
async function windowLike(options: BrowserContextOptions): Promise<Page> {
  const first = await browser.newWindow(server.url);
  const context = await first
    .context()
    .browser()!
    .newContext({ baseURL: server.url, ...options });
  return context.newPage();
}

describe("in every window", () => {
  // The pages of conventions are made of the same pieces; axe looks at them in everyPage.test.ts.
  it.each([
    ["light", 1440, ["/ui?errors", "/no/such/page"]],
    ["light", 320, ["/ui?errors", ...CONVENTIONS]],
    ["dark", 1440, ["/ui?errors"]],
  ] as const)(
    "%s, %d px wide: axe finds nothing, and only tables scroll sideways",
    async (colorScheme, width, addresses) => {
      const page = await windowLike({ colorScheme, viewport: { width, height: 900 } });
      for (const address of addresses) {
        await page.goto(address);
        if (!CONVENTIONS.includes(address)) await expectAccessible(page);
        const wide = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
        expect(wide, `${address} is wider than the window`).toBeLessThanOrEqual(0);
      }
      await page.context().close();
    },
    150_000,
  ); // ten pages, some of them long

  it("keeps every control at least 24 px high or so far from the next", async () => {
    const page = await windowLike({ viewport: { width: 390, height: 844 } });
    await page.goto("/ui");
    const close = await page.evaluate(() => {
      const boxes = [...document.querySelectorAll("a, button, input, select, textarea, summary")]
        .filter((control) => !control.matches(".skip"))
        .map((control) => ({ control, box: control.getBoundingClientRect() }))
        .filter(({ box }) => box.width > 0);
      const middle = (box: DOMRect) => [box.left + box.width / 2, box.top + box.height / 2] as const;
      // WCAG 2.2, 2.5.8: a circle of 24 px around the middle of a small target touches no other target.
      return boxes
        .filter(({ box }) => box.width < 24 || box.height < 24)
        .filter(({ control, box }) => {
          const [x, y] = middle(box);
          return boxes.some(({ control: other, box: next }) => {
            if (other === control) return false;
            const dx = Math.max(next.left - x, 0, x - next.right);
            const dy = Math.max(next.top - y, 0, y - next.bottom);
            return Math.hypot(dx, dy) < 12;
          });
        })
        .map(({ control }) => control.outerHTML.slice(0, 120));
    });
    expect(close).toEqual([]);
    await page.context().close();
  });
});

describe("with the keyboard", () => {
  it("never hides the focused control under the head of a table or the decision bar", async () => {
    const page = await windowLike({ viewport: { width: 1280, height: 700 } });
    await page.goto("/ui");
    const hidden: string[] = [];
    for (let presses = 0; presses < 80; presses += 1) {
      await page.keyboard.press("Tab");
      const covered = await page.evaluate(() => {
        const control = document.activeElement;
        if (!control || control === document.body) return null;
        const box = control.getBoundingClientRect();
        if (box.height > 400) return null;
        const seen = document.elementFromPoint(box.left + box.width / 2, box.top + box.height / 2);
        return seen && (control.contains(seen) || seen.contains(control)) ? null : control.outerHTML.slice(0, 120);
      });
      if (covered) hidden.push(covered);
    }
    expect(hidden).toEqual([]);
    await page.context().close();
  });

  it("starts with a link that skips to the text", async () => {
    const page = await browser.newWindow(server.url);
    await page.goto("/ui");
    await page.keyboard.press("Tab");
    await page.keyboard.press("Enter");
    expect(await page.evaluate(() => document.activeElement?.id)).toBe("text");
  });
});

describe("a table", () => {
  it("sorts by a button in the column's head, says so, and keeps the focus there", async () => {
    const page = await browser.newWindow(server.url);
    await page.goto("/ui?phase=g");
    const head = page.getByRole("columnheader", { name: /^S°/ });
    await head.getByRole("button").click();
    await head.and(page.locator("[aria-sort=ascending]")).waitFor();
    expect(page.url()).toContain("/ui?phase=g&sort=entropy");
    // S° of CO3-2(aq) is the lowest of the sample figures.
    expect(await page.getByRole("rowheader").first().textContent()).toBe("CO32−(aq)");
    expect(await page.evaluate(() => document.activeElement?.className)).toBe("sort");
    await head.getByRole("button").click();
    await head.and(page.locator("[aria-sort=descending]")).waitFor();
    expect(page.url()).toContain("/ui?phase=g&sort=-entropy");
  });

  it("keeps rows without a value last, whichever way it is sorted", async () => {
    const page = await browser.newWindow(server.url);
    for (const sort of ["gibbsEnergyOfFormation", "-gibbsEnergyOfFormation"]) {
      await page.goto(`/ui?sort=${sort}`);
      const names = await page.getByRole("table").first().getByRole("rowheader").allTextContents();
      expect(names.slice(-2).sort()).toEqual(["CdSO4·8/3H2O(cr)", "ZnO(cr)"]);
    }
  });

  it("is copied as plain ASCII with keys as programs write them", async () => {
    const page = await browser.newWindow(server.url);
    await page.context().grantPermissions(["clipboard-read", "clipboard-write"]);
    await page.goto("/ui");
    await page.getByRole("row", { name: /carbonate ion/ }).evaluate((row) => {
      const range = document.createRange();
      range.selectNode(row);
      const selection = document.getSelection();
      selection?.removeAllRanges();
      selection?.addRange(range);
    });
    await page.keyboard.press("Control+c");
    const copied = await page.evaluate(() => navigator.clipboard.readText());
    expect(copied).toBe("CO3-2(aq)\tcarbonate ion\t-675.23(12)\t-50.0(5)\t-527.90\t1");
  });
});

describe("a change of page in the browser", () => {
  it("moves the focus to the page's head and announces the title", async () => {
    const page = await browser.newWindow(server.url);
    await page.goto("/ui");
    await page.getByRole("navigation", { name: "Sections" }).getByRole("link", { name: "Conventions" }).click();
    await page.waitForURL("**/conventions");
    await page.waitForFunction(() => document.activeElement?.tagName === "H1");
    expect(await page.locator("[aria-live=polite]").textContent()).toBe("Conventions · Tablewright");
  });
});

describe("the conventions", () => {
  it("lead from the first page to each of their pages, from there to every other, and to each check and back", async () => {
    const page = await browser.newWindow(server.url);
    await page.goto("/conventions");
    await page.getByRole("main").getByRole("link", { name: "Symbols" }).click();
    for (const [name, heading] of [
      ["States", "States"],
      ["Units", "Units"],
      ["Uncertainty", "Uncertainty"],
      ["Spellings", "Spellings"],
      ["Checks", "What is checked"],
    ] as const) {
      const pages = page.getByRole("navigation", { name: "Pages of the conventions" });
      await pages.getByRole("link", { name }).click();
      await page.getByRole("heading", { level: 1, name: heading }).waitFor();
      expect(await pages.getByRole("link", { name }).getAttribute("aria-current")).toBe("page");
    }
    await page.getByRole("link", { name: "Gibbs closure" }).click();
    await page.getByRole("heading", { level: 1, name: "Gibbs closure" }).waitFor();
    await page.getByRole("link", { name: "all checks" }).click();
    await page.waitForURL("**/conventions/checks");
  });
});

describe("a form with something wrong", () => {
  it("shows a summary that takes the focus and leads to the field", async () => {
    const page = await browser.newWindow(server.url);
    await page.goto("/ui?errors");
    await page.waitForFunction(() => document.activeElement?.classList.contains("error-summary"));
    await page.getByRole("alert").getByRole("link", { name: "Email" }).click();
    expect(await page.evaluate(() => document.activeElement?.id)).toBe("email");
    const field = page.getByRole("textbox", { name: "Email" });
    expect(await field.getAttribute("aria-invalid")).toBe("true");
    expect(await field.getAttribute("aria-describedby")).toBe("email-error");
  });
});

describe("before scripts arrive", () => {
  it("sorts, opens the list of editions and shows every piece", async () => {
    const page = await windowLike({ javaScriptEnabled: false });
    await page.goto("/ui");
    await page.getByRole("columnheader", { name: "Name" }).first().getByRole("button").click();
    expect(page.url()).toContain("sort=name");
    expect(await page.getByRole("rowheader").first().textContent()).toBe("Al2O3(cr, corundum)");
    await page.getByText("other editions").click();
    expect(await page.getByRole("link", { name: "Edition 6" }).isVisible()).toBe(true);
    await page.context().close();
  });
});

describe("what is rendered", () => {
  it("holds only characters that the shipped font files have", async () => {
    const page = await browser.newWindow(server.url);
    for (const address of ["/ui", ...CONVENTIONS]) {
      await page.goto(address);
      const text = await page.evaluate(() => document.body.innerText);
      // The unicode-range lists of app/styles/typeface.css.
      const strange = [...new Set(text.replace(/[\u0000-\u024f\u0370-\u03ff\u2000-\u206f\u2212]/g, ""))].join("");
      expect(strange, address).toBe("");
    }
  });
});
