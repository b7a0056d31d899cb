/** Pixels of a picture for each of its own, so that it stays sharp in a document. */
const SHARPNESS = 2;
/** The same attributes that a style sheet would give, written out for a picture that stands alone. */
const INKED = [
  "fill",
  "stroke",
  "stroke-width",
  "stroke-dasharray",
  "opacity",
  "font-size",
  "font-family",
  "font-weight",
  "paint-order",
];

/** SVG text as a PNG on the ground of the page, in base64. */
export async function pngOf(svgText: string): Promise<string> {
  const image = new Image();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svgText)}`;
  await image.decode();
  const canvas = document.createElement("canvas");
  canvas.width = image.naturalWidth * SHARPNESS;
  canvas.height = image.naturalHeight * SHARPNESS;
  const context = canvas.getContext("2d");
  if (context === null) throw new Error("there is no canvas");
  context.fillStyle = getComputedStyle(document.body).backgroundColor;
  context.fillRect(0, 0, canvas.width, canvas.height);
  context.drawImage(image, 0, 0, canvas.width, canvas.height);
  // `toBlob` waits until the page has nothing to do, which may be seconds.
  const url = canvas.toDataURL("image/png");
  const start = "data:image/png;base64,";
  if (!url.startsWith(start)) throw new Error("the picture is too large");
  return url.slice(start.length);
}

export const pngBlob = (base64: string): Blob =>
  new Blob([Uint8Array.from(atob(base64), (character) => character.charCodeAt(0))], { type: "image/png" });

/** A picture of the page as SVG text without the page's style sheet. */
export function standalone(picture: SVGSVGElement): string {
  const copy = picture.cloneNode(true) as SVGSVGElement;
  const [from, to] = [picture.querySelectorAll("*"), copy.querySelectorAll("*")];
  from.forEach((element, i) => {
    if (element.classList.contains("hit")) {
      to[i].remove();
      return;
    }
    const style = getComputedStyle(element);
    for (const name of INKED) to[i].setAttribute(name, style.getPropertyValue(name));
    for (const name of ["class", "id", "role", "aria-selected"]) to[i].removeAttribute(name);
  });
  copy.removeAttribute("class");
  copy.setAttribute("xmlns", "http://www.w3.org/2000/svg");
  return new XMLSerializer().serializeToString(copy);
}
