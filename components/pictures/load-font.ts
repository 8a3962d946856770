let loading: Promise<string> | null = null;

/** Our typeface as `@font-face` rules that carry the font themselves; empty where it cannot be read (text then takes the reader's fonts). */
export function loadFontCss(): Promise<string> {
  loading ??= Promise.all(fontFaces().map(embedFace)).then(
    (faces) => faces.join(""),
    () => {
      loading = null;
      return "";
    },
  );
  return loading;
}

interface Face {
  weight: string;
  address: string;
}

/** Where the page itself has the typeface from. */
function fontFaces(): Face[] {
  return Array.from(document.styleSheets).flatMap((sheet) =>
    Array.from(sheet.cssRules).flatMap((rule) => {
      if (!(rule instanceof CSSFontFaceRule) || !rule.style.getPropertyValue("font-family").includes("Roboto Flex")) {
        return [];
      }
      const address = /url\(["']?([^"')]+)/.exec(rule.style.getPropertyValue("src"))?.[1];
      if (!address) return [];
      const weight = rule.style.getPropertyValue("font-weight") || "400";
      return [{ weight, address: new URL(address, sheet.href ?? document.baseURI).href }];
    }),
  );
}

async function embedFace({ weight, address }: Face): Promise<string> {
  const answer = await fetch(address);
  if (!answer.ok) throw new Error(`the font ${address} answered ${answer.status}`);
  const data = await readAsDataAddress(await answer.blob());
  return `@font-face{font-family:"Roboto Flex";font-weight:${weight};src:url(${data}) format("woff2")}`;
}

function readAsDataAddress(blob: Blob): Promise<string> {
  return new Promise((resolve, reject) => {
    const reader = new FileReader();
    reader.onload = () => resolve(String(reader.result));
    reader.onerror = () => reject(reader.error ?? new Error("a font could not be read"));
    reader.readAsDataURL(blob);
  });
}
