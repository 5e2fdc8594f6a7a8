/** What was weighed: filled in by the rule's own file. */
export type NetContentsInput = Record<string, unknown>
/** Every step to the decision. */
export type NetContentsWorksheet = Record<string, unknown>
