import type { DemoYard } from "../scenario"

/** Three yards with fifteen hives; the undermost super of a stack stands first. */
export const larkmoorYards: readonly DemoYard[] = [
	{
		name: "Home yard",
		flora: "white clover",
		hives: [
			[
				{ code: "41", setDaysAgo: 33, looked: { daysAgo: 2, full: 40, capped: 40 } },
				{ code: "11", setDaysAgo: 16, looked: { daysAgo: 2, full: 16, capped: 3, isDrawn: true } },
			],
			[
				{
					code: "41",
					setDaysAgo: 34,
					looked: { daysAgo: 2, full: 40, capped: 40, note: "Heavy, and every cell sealed." },
					escapeDaysAgo: 1,
				},
				{ code: "11", setDaysAgo: 22, looked: { daysAgo: 2, full: 33, capped: 12, isDrawn: true } },
			],
			[{ code: "11", setDaysAgo: 24, looked: { daysAgo: 2, full: 30, capped: 15, isDrawn: true } }],
			[
				{ code: "21", setDaysAgo: 31, looked: { daysAgo: 2, full: 40, capped: 32, isDrawn: true }, readyAfterDays: 1 },
				{ code: "22", setDaysAgo: 10, looked: { daysAgo: 2, full: 4, capped: 0, isDrawn: true } },
			],
			[
				{ code: "41", setDaysAgo: 21, looked: { daysAgo: 2, full: 27, capped: 10, isDrawn: true } },
				{ code: "11", setDaysAgo: 1 },
			],
			[
				{ code: "21", setDaysAgo: 30, looked: { daysAgo: 2, full: 39, capped: 30 }, readyAfterDays: 1 },
				{ code: "11", setDaysAgo: 15, looked: { daysAgo: 2, full: 15, capped: 3, isDrawn: true } },
			],
		],
	},
	{
		name: "Weld Farm",
		flora: "sainfoin",
		hives: [
			[
				{ code: "31", setDaysAgo: 31, looked: { daysAgo: 4, full: 40, capped: 40 } },
				{ code: "31", setDaysAgo: 17, looked: { daysAgo: 4, full: 18, capped: 5, isDrawn: true } },
			],
			[
				{
					code: "31",
					setDaysAgo: 26,
					looked: { daysAgo: 4, full: 37, capped: 27, isDrawn: true, note: "Even caps, some cells dark at the edge." },
				},
			],
			[
				{ code: "51", setDaysAgo: 28, looked: { daysAgo: 4, full: 39, capped: 37 } },
				{ code: "31", setDaysAgo: 9, looked: { daysAgo: 4, full: 0, capped: 0, isDrawn: true } },
			],
			[{ code: "31", setDaysAgo: 20, looked: { daysAgo: 4, full: 21, capped: 6, isDrawn: true } }],
			[
				{ code: "31", setDaysAgo: 22, looked: { daysAgo: 4, full: 29, capped: 11 } },
				{ code: "51", setDaysAgo: 4 },
			],
		],
	},
	{
		name: "Canal Bank",
		flora: "wildflower",
		hives: [
			[
				{ code: "52", setDaysAgo: 33, looked: { daysAgo: 3, full: 39, capped: 31 }, readyAfterDays: 5 },
				{ code: "52", setDaysAgo: 21, looked: { daysAgo: 3, full: 33, capped: 20, isDrawn: true }, readyAfterDays: 6 },
			],
			[{ code: "52", setDaysAgo: 12, looked: { daysAgo: 3, full: 2, capped: 0, isDrawn: true } }],
			[
				{ code: "52", setDaysAgo: 31, looked: { daysAgo: 3, full: 36, capped: 27, isDrawn: true }, readyAfterDays: 5 },
				{ code: "52", setDaysAgo: 9, looked: { daysAgo: 3, full: 0, capped: 0 } },
			],
			[
				{
					code: "52",
					setDaysAgo: 20,
					looked: { daysAgo: 11, full: 5, capped: 0, isDrawn: true, note: "Gate was locked, looked in a hurry." },
				},
			],
		],
	},
]
