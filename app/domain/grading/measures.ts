import { formatHundredths } from "./hundredths"

/**
 * What is measured on comb. Limits and facts are whole hundredths of the unit: 1250 is 12.5 oz, 8500 is 85 %.
 */
export const measures = {
	netOz: { label: "Net weight of the lightest piece", unit: "oz", side: "least" },
	grossOz: { label: "Gross weight of the lightest piece", unit: "oz", side: "least" },
	attachedPercent: { label: "Joined to the wood, of the way round", unit: "%", side: "least" },
	unsealedCells: { label: "Unsealed cells on a side, beyond the row next to the wood", unit: "cells", side: "most" },
	sealedPercent: { label: "Surface filled and sealed", unit: "%", side: "least" },
	soiledPercent: { label: "Surface soiled", unit: "%", side: "most" },
	fullWeightPercent: { label: "Weight, of a full section", unit: "%", side: "least" },
	combPercent: { label: "Comb, of the net weight", unit: "%", side: "least" },
	combPieces: { label: "Pieces of comb in a jar", unit: "pieces", side: "most" },
	brokenPieces: { label: "Broken pieces of comb in a jar", unit: "pieces", side: "most" },
} as const

export type Measure = keyof typeof measures

/** All measures, in the order of the form. */
export const measureNames = Object.keys(measures) as Measure[]

/** "12.5 oz", "85 %", "6 cells", "1 piece". */
export function measureWords(measure: Measure, hundredths: number): string {
	const { unit } = measures[measure]
	const plain = formatHundredths(hundredths)
	return `${plain} ${hundredths === 100 && unit.endsWith("s") ? unit.slice(0, -1) : unit}`
}
