/** The innermost element that says something, also where a date in it has an element of its own. */
export const saying = (pattern: RegExp) => (_own: string, element: Element | null) => {
  const says = (one: Element) => pattern.test((one.textContent ?? '').replace(/\s+/g, ' '));
  return element !== null && says(element) && !Array.from(element.children).some(says);
};
