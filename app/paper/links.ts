import type {
  Definition,
  FootnoteDefinition,
  Image,
  ImageReference,
  Link,
  LinkReference,
  PhrasingContent,
  Root,
} from "mdast";
import type { Reading } from "./reading.ts";

/** Gathers `[name]: url` (the first of several of one name counts, as in CommonMark) and the names of footnotes. */
export function collectDefinitions(reading: Reading, root: Root): void {
  const pending: { children: readonly unknown[] }[] = [root];
  for (let next = pending.pop(); next !== undefined; next = pending.pop()) {
    for (const child of next.children) {
      if (isDefinition(child) && !reading.definitions.has(child.identifier)) {
        reading.definitions.set(child.identifier, { url: child.url, title: child.title ?? null });
      }
      if (isFootnote(child)) reading.footnotes.add(child.identifier);
      if (hasChildren(child)) pending.push(child);
    }
  }
}

function isDefinition(node: unknown): node is Definition {
  return typeof node === "object" && node !== null && "type" in node && node.type === "definition";
}

function isFootnote(node: unknown): node is FootnoteDefinition {
  return typeof node === "object" && node !== null && "type" in node && node.type === "footnoteDefinition";
}

function hasChildren(node: unknown): node is { children: readonly unknown[] } {
  return typeof node === "object" && node !== null && "children" in node && Array.isArray(node.children);
}

/**
 * The address of a link as it may be followed: http, https, mailto, or a DOI (made an https address). null for any
 * other, which could run something or lead into the program itself.
 */
function allowedUrl(url: string): string | null {
  const trimmed = url.trim();
  if (/^(https?:\/\/|mailto:)[^\s]+$/i.test(trimmed)) return trimmed;
  const doi = /^doi:\s*(10\.\S+)$/i.exec(trimmed)?.[1];
  return doi === undefined ? null : `https://doi.org/${doi}`;
}

/** A link whose address is allowed, or else its words. */
export function settleLink(reading: Reading, node: Link | LinkReference, words: PhrasingContent[]): PhrasingContent[] {
  const definition = node.type === "link" ? node : reading.definitions.get(node.identifier);
  if (definition === undefined) return asWritten(reading, node, words);
  const url = allowedUrl(definition.url);
  if (url === null) {
    const message = `A link leads to an address with http, https, mailto or doi; “${definition.url.slice(0, 60)}” is none, so its words are set without a link.`;
    reading.report(reading.from(node), reading.to(node), message);
    return words;
  }
  const { position } = node;
  return [{ type: "link", url, title: definition.title ?? null, children: words.filter(isNoLink), position }];
}

/** Words in brackets that nothing defines, with their brackets. */
function asWritten(reading: Reading, node: Link | LinkReference, words: PhrasingContent[]): PhrasingContent[] {
  const first = node.children.at(0);
  const last = node.children.at(-1);
  const { text } = reading;
  if (first === undefined || last === undefined)
    return [{ type: "text", value: text.slice(reading.from(node), reading.to(node)) }];
  return [
    { type: "text", value: text.slice(reading.from(node), reading.from(first)) },
    ...words,
    { type: "text", value: text.slice(reading.to(last), reading.to(node)) },
  ];
}

function isNoLink(node: PhrasingContent): boolean {
  return node.type !== "link";
}

/** An image of an uploaded file, or else its description. */
export function settleImage(reading: Reading, node: Image | ImageReference): PhrasingContent {
  const definition = node.type === "image" ? node : reading.definitions.get(node.identifier);
  const url = definition?.url ?? "";
  const { position } = node;
  const alt = node.alt ?? "";
  let name = url;
  try {
    name = decodeURIComponent(url);
  } catch (cause) {
    if (!(cause instanceof URIError)) throw cause;
  }
  if (/^[^/\\:?#\s][^/\\:?#\r\n]*\.[A-Za-z0-9]+$/.test(name)) {
    return { type: "image", url: name, alt, title: definition?.title ?? null, position };
  }
  const message = `An image is the name of an uploaded file, as in ![caption](figure.png); “${url.slice(0, 60)}” is none.`;
  reading.report(reading.from(node), reading.to(node), message);
  return { type: "text", value: alt, position };
}
