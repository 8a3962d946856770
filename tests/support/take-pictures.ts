// Pictures of every screen at both sizes into docs/pictures, from an application that runs with the demo:
//   BASE_URL=http://127.0.0.1:3000 node --import tsx tests/support/take-pictures.ts [screen …]
import { mkdirSync } from "node:fs";
import sharp from "sharp";
import type { Browser } from "playwright-core";
import { DEMO_PASSWORD } from "@/lib/access/demo-accounts";
import { beginVisit, openBrowser, signInAs, SIZES, type SizeName } from "@/tests/e2e/open-browser";
import { listScreens, OWNER, type Screen } from "@/tests/e2e/screens";
import { signInAt } from "@/tests/support/server";

const FOLDER = "docs/pictures";
const BASE_URL = process.env.BASE_URL ?? "http://127.0.0.1:3000";
/** Maps draw a little after the last tile has come. */
const SETTLE_MS = 2_500;

async function takePictures(browser: Browser, size: SizeName, screens: Screen[]): Promise<void> {
  const { page, context } = await beginVisit(browser, size);
  let isSignedIn = false;
  // Those for everybody first: signed in, the front page leads elsewhere.
  for (const { name, path, isPublic } of screens.toSorted((a, b) => Number(!a.isPublic) - Number(!b.isPublic))) {
    if (!isPublic && !isSignedIn) {
      await signInAs(page, BASE_URL, OWNER);
      isSignedIn = true;
    }
    await page.goto(BASE_URL + path);
    await page.waitForLoadState("networkidle");
    await page.waitForTimeout(SETTLE_MS);
    const picture = await page.screenshot();
    await sharp(picture).png({ palette: true, compressionLevel: 9 }).toFile(`${FOLDER}/${name}-${size}.png`);
    console.log(`${name}-${size}.png`);
  }
  await context.close();
}

mkdirSync(FOLDER, { recursive: true });
const all = await listScreens({
  baseUrl: BASE_URL,
  signIn: (email, password = DEMO_PASSWORD) => signInAt(BASE_URL, email, password),
});
const wanted = process.argv.slice(2);
const screens = wanted.length === 0 ? all : all.filter(({ name }) => wanted.includes(name));
const browser = await openBrowser();
for (const size of Object.keys(SIZES) as SizeName[]) await takePictures(browser, size, screens);
await browser.close();
