/** A grade scheme as data. */
export type GradeScheme = Record<string, unknown>
/** What was seen on a lot. */
export type GradingFacts = Record<string, unknown>
