/**
 * URIs as keys and as paths below a folder. Clients write the same file in several ways (`c%3A` and `C:`, encoded
 * and plain letters), so nothing here compares URIs as text.
 */

/** The same for all spellings of a URI. */
export function keyOf(uri: string): string {
  const plain = decoded(uri).replace(
    /^(file:\/{2,3})([A-Za-z]):/,
    (_, start, drive) => `${start}${drive.toLowerCase()}:`,
  );
  return plain.length > 1 && plain.endsWith("/") && !plain.endsWith("//") ? plain.slice(0, -1) : plain;
}

export const schemeOf = (uri: string): string => /^([a-z][a-z0-9+.-]*):/i.exec(uri)?.[1].toLowerCase() ?? "";

/** Path of a file below a folder, with `/`; undefined when it lies elsewhere. */
export function pathBelow(folder: string, uri: string): string | undefined {
  const [base, key] = [keyOf(folder), keyOf(uri)];
  const start = base.endsWith("/") ? base : `${base}/`;
  return key.startsWith(start) ? key.slice(start.length) : undefined;
}

/** The folder that holds a file. */
export function folderOf(uri: string): string {
  const end = uri.lastIndexOf("/");
  return end < 0 ? `${schemeOf(uri)}:` : uri.slice(0, end);
}

export function nameOf(uri: string): string {
  const path = decoded(uri);
  return path.slice(Math.max(path.lastIndexOf("/"), path.indexOf(":")) + 1);
}

/** The URI of a path relative to a folder; `..` leads upwards. */
export function uriOf(folder: string, path: string): string {
  if (/^[a-zA-Z][\w+.-]+:/.test(path)) return path;
  const start = /^[a-z][a-z0-9+.-]*:(\/\/[^/]*)?/i.exec(folder)?.[0] ?? "";
  const parts = path.startsWith("/") ? [""] : folder.slice(start.length).replace(/\/$/, "").split("/");
  for (const part of path.split("/")) {
    if (part === "..") {
      if (parts.length > 1) parts.pop();
    } else if (part !== "." && part !== "") parts.push(encodeURIComponent(whole(part)));
  }
  return start + parts.join("/");
}

/** Half of a surrogate pair cannot be encoded. */
const whole = (text: string): string => text.replace(/\p{Surrogate}/gu, "\ufffd");

function decoded(uri: string): string {
  try {
    return decodeURIComponent(uri);
  } catch {
    return uri;
  }
}
