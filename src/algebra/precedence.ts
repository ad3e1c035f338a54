/** The one precedence table that every printer uses: a child binds at least as tightly as its place demands. */
export const PRECEDENCE = { sum: 1, product: 2, sign: 3, power: 4, atom: 5 } as const;
export type Level = (typeof PRECEDENCE)[keyof typeof PRECEDENCE];

/** Text in brackets when it binds less tightly than the place it goes to. */
export const bracketed = (text: string, level: Level, needed: Level): string => (level < needed ? `(${text})` : text);
