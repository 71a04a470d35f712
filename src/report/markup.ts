/**
 * A small page builder on linkedom: every text and attribute goes through the document object model, so it is
 * escaped by construction. Only the members used here are typed; the library has no DOM typings.
 */
import { parseHTML } from "linkedom";

/** An element, as far as this library needs one. */
export interface MarkupElement {
  textContent: string;
  readonly outerHTML: string;
  getAttribute(name: string): string | null;
  setAttribute(name: string, value: string): void;
  append(...children: (MarkupElement | string)[]): void;
  querySelectorAll(selector: string): Iterable<MarkupElement>;
}

/** A document, as far as this library needs one. */
export interface MarkupDocument {
  readonly documentElement: MarkupElement;
  readonly head: MarkupElement;
  readonly body: MarkupElement;
  createElement(name: string): MarkupElement;
  createElementNS(namespace: string, name: string): MarkupElement;
}

const SVG = "http://www.w3.org/2000/svg";

/** A new empty HTML document. */
export function newDocument(): MarkupDocument {
  const window = parseHTML("<!doctype html><html><head></head><body></body></html>") as unknown as {
    readonly document: MarkupDocument;
  };
  return window.document;
}

/**
 * linkedom writes HTML attributes with quotes escaped but ampersands as they are, so `&quot;` in a file name
 * would come back as a quote. Escaping the ampersand first makes the attribute read back unchanged.
 */
export function setAttribute(element: MarkupElement, name: string, value: string): void {
  element.setAttribute(name, value.replaceAll("&", "&amp;"));
}

/** Makes elements of one document. */
export interface ElementFactory {
  /** An HTML element with attributes and children; text children are escaped. */
  html(
    name: string,
    attributes: Readonly<Record<string, string>>,
    ...children: (MarkupElement | string)[]
  ): MarkupElement;
  /** The same for SVG. */
  svg(
    name: string,
    attributes: Readonly<Record<string, string>>,
    ...children: (MarkupElement | string)[]
  ): MarkupElement;
}

/** A factory for the elements of a document. */
export function elementFactory(document: MarkupDocument): ElementFactory {
  const build = (
    element: MarkupElement,
    attributes: Readonly<Record<string, string>>,
    children: (MarkupElement | string)[],
  ): MarkupElement => {
    for (const [name, value] of Object.entries(attributes)) setAttribute(element, name, value);
    element.append(...children);
    return element;
  };
  return {
    html: (name, attributes, ...children) => build(document.createElement(name), attributes, children),
    svg: (name, attributes, ...children) => build(document.createElementNS(SVG, name), attributes, children),
  };
}
