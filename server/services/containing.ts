/** A pattern for what holds a typed text. It is no pattern itself: its wildcards stand for themselves. */
export const containing = (text: string): string => `%${text.replace(/[\\%_]/g, '\\$&')}%`;
