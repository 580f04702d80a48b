import { useEffect } from "react";
import { plainAscii } from "./plainCopy.ts";

/**
 * The one `copy` listener: what is taken from a page arrives as plain ASCII. Typeset pieces carry their plain spelling in
 * `data-plain` ("SO4-2(aq)", "kJ/mol"), cells are parted by tabs and rows by lines, so a copied table pastes as one.
 */
export function CopyPlain() {
  useEffect(() => {
    const onCopy = (event: ClipboardEvent) => {
      const selection = document.getSelection();
      // Inside a field the browser's own copy is right.
      if (!selection || selection.isCollapsed || event.target instanceof HTMLInputElement) return;
      if (event.target instanceof HTMLTextAreaElement) return;
      event.clipboardData?.setData("text/plain", plainText(selection));
      event.preventDefault();
    };
    document.addEventListener("copy", onCopy);
    return () => document.removeEventListener("copy", onCopy);
  }, []);
  return null;
}

function plainText(selection: Selection): string {
  const range = selection.getRangeAt(0);
  const copied = range.cloneContents();
  takePlainSpelling(range, copied);
  for (const hidden of copied.querySelectorAll(".said")) hidden.remove();
  return plainAscii(
    written(copied)
      .replace(/[ \t]+\n/g, "\n")
      .replace(/\n{3,}/g, "\n\n")
      .trim(),
  );
}

/** Puts the plain spelling in place of each typeset piece that is selected whole. */
function takePlainSpelling(range: Range, copied: DocumentFragment): void {
  const ancestor = range.commonAncestorContainer;
  const root = ancestor instanceof Element ? ancestor : ancestor.parentElement;
  const onPage = [...(root?.querySelectorAll("[data-plain]") ?? [])].filter((piece) => range.intersectsNode(piece));
  const pieces = [...copied.querySelectorAll("[data-plain]")];
  pieces.forEach((piece, index) => {
    const original = onPage[index];
    if (original && original.textContent === piece.textContent) piece.textContent = piece.getAttribute("data-plain");
  });
}

const blocks = new Set(["P", "DIV", "LI", "TR", "H1", "H2", "H3", "SECTION", "CAPTION", "DT", "DD", "HEADER"]);

function written(node: Node): string {
  if (node.nodeType === Node.TEXT_NODE) return (node.textContent ?? "").replace(/\s*\n\s*/g, " ");
  const inside = [...node.childNodes].map(written).join("");
  if (!(node instanceof Element)) return inside;
  if (node.tagName === "TD" || node.tagName === "TH") return `${inside}\t`;
  if (node.tagName === "BR") return "\n";
  return blocks.has(node.tagName) ? `${inside}\n` : inside;
}
