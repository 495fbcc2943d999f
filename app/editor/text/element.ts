/** Makes an element with a class, attributes and children: the little that the typeset pieces need of the DOM. */
export function element<Tag extends keyof HTMLElementTagNameMap>(
  tag: Tag,
  className: string,
  children: readonly (Node | string)[] = [],
  attributes: Readonly<Record<string, string>> = {},
): HTMLElementTagNameMap[Tag] {
  const made = document.createElement(tag);
  if (className !== "") made.className = className;
  for (const [name, value] of Object.entries(attributes)) made.setAttribute(name, value);
  made.append(...children);
  return made;
}
