/** What can be seen wrong with comb, as it stands in a sentence: "The comb shows pollen cells." */
export const faults = {
	"pollen-cells": "Pollen cells",
	honeydew: "Insect honeydew",
	granulation: "Extensive granulation",
	unripe: "Poorly ripened honey",
	sour: "Sour honey",
	weeping: "Weeping cappings",
	leaking: "Leaking, injured or patched comb",
	stain: "Propolis or another stain",
	"travel-stain": "Travel stain",
	projecting: "Comb that stands out beyond the wood",
	uneven: "Uneven capping",
	"mixed-colour": "More than one colour",
	crooked: "Crooked comb",
} as const

export type Fault = keyof typeof faults

/** All faults, in the order of the form. */
export const faultNames = Object.keys(faults) as Fault[]

/** What "good quality" excludes. Source: Wis. Admin. Code ATCP 87.01. */
export const GOOD_QUALITY_EXCLUDES: readonly Fault[] = [
	"pollen-cells",
	"honeydew",
	"granulation",
	"unripe",
	"sour",
	"weeping",
	"leaking",
]
