/** The four levels of a finding, gravest first. */
export const FINDING_LEVELS = ['blocks issue', 'to be accepted', 'to be noted', 'information'] as const;
export type FindingLevel = (typeof FINDING_LEVELS)[number];

/**
 * One sentence of the catalogue. `{name}` takes a value with the unit of its name (`value` and `limit` take the
 * remark's own); `{name:one|many}` a count with its noun; a part in [brackets] is left out where one of its values is.
 */
export interface Message {
  text: string;
  /** stands in a list that has the value and the limit in columns of their own; else `text` does */
  subject?: string;
  /** how grave it is as a finding */
  level: FindingLevel;
  /** what it means or what to do about it */
  consequence: string;
}

/** Messages by remark code. */
export type Messages = Readonly<Record<string, Message>>;
