import { type Fault, faultNames, GOOD_QUALITY_EXCLUDES } from "./faults"
import type { GradeRule, GradeScheme, SchemeColour } from "./grade-comb"

/** A published scheme to start from. `isVerified` says whether its limits were read at the source. */
export type SchemeTemplate = { name: string; isVerified: boolean; scheme: GradeScheme }

const rule = (name: string, { excludes = [], ...more }: Partial<GradeRule> = {}): GradeRule => ({
	name,
	limits: {},
	outsideRowMayBeOpen: true,
	// In the order of the form, so that a scheme that is kept unchanged stays the same.
	excludes: faultNames.filter((fault) => excludes.includes(fault)),
	colours: [],
	...more,
})

/** Wis. Admin. Code ATCP 87.04: White under 35 mm, Golden 35 to 85 mm, Dark over 85 mm. */
const WISCONSIN_COLOURS: SchemeColour[] = [
	{ name: "White", toPfundTenths: 350, isUnder: true },
	{ name: "Golden", toPfundTenths: 850, isUnder: false },
	{ name: "Dark", toPfundTenths: null, isUnder: false },
]

const wisconsinFaults: Fault[] = [...GOOD_QUALITY_EXCLUDES, "stain", "projecting"]

/** Firmly attached: joined to the wood at least 85 % of the way round. Source: ATCP 87.01. */
const FIRMLY_ATTACHED = 8500

const WISCONSIN_SOURCE =
	"Wis. Admin. Code ATCP 87.01, 87.04, 87.05. The number of unsealed cells that No. 1 allows was not seen: write your own."

const sectionScheme = (source: string, grades: GradeRule[], more: Partial<GradeScheme> = {}): GradeScheme => ({
	source,
	forms: ["round", "basswood", "clear-box"],
	grades,
	colours: [],
	caseRule: null,
	belowPercent: 0,
	...more,
})

const wisconsinSections: SchemeTemplate = {
	name: "Wisconsin, sections",
	isVerified: true,
	scheme: sectionScheme(
		WISCONSIN_SOURCE,
		[
			rule("Wisconsin Fancy White", {
				limits: { netOz: 1250, grossOz: 1350, attachedPercent: FIRMLY_ATTACHED, unsealedCells: 0 },
				excludes: [...wisconsinFaults, "travel-stain", "uneven", "mixed-colour"],
				colours: ["White"],
			}),
			rule("Wisconsin No. 1", {
				limits: { netOz: 1100, grossOz: 1200, attachedPercent: FIRMLY_ATTACHED },
				excludes: wisconsinFaults,
			}),
		],
		{ colours: WISCONSIN_COLOURS },
	),
}

const wisconsinChunk: SchemeTemplate = {
	name: "Wisconsin, chunk honey",
	isVerified: true,
	scheme: {
		source: "Wis. Admin. Code ATCP 87.05: half of the net weight is comb, in at most two pieces, none broken.",
		forms: ["chunk"],
		grades: [
			rule("Wisconsin No. 1", {
				limits: { combPercent: 5000, combPieces: 200, brokenPieces: 0 },
				excludes: [...GOOD_QUALITY_EXCLUDES, "stain"],
			}),
		],
		colours: WISCONSIN_COLOURS,
		caseRule: null,
		belowPercent: 0,
	},
}

const colorado: SchemeTemplate = {
	name: "Colorado, No. 1 White (1911)",
	isVerified: true,
	scheme: sectionScheme(
		"Colorado State Bee Keepers' Association, in Phillips, Bees, USDA Farmers' Bulletin 447 (about 1911). Whether the 13.5 oz are net is not said; they are taken as net.",
		[rule("No. 1 White", { limits: { netOz: 1350 } })],
		{ caseRule: { pieces: 24, leastNetLb: { separators: 21, half: 22, none: 23 } } },
	),
}

const eastern: SchemeTemplate = {
	name: "Eastern rules (1911)",
	isVerified: true,
	scheme: sectionScheme(
		"Eastern rules, in Phillips, Bees, USDA Farmers' Bulletin 447 (about 1911). What “an occasional cell” is, is not said: write your own.",
		[
			rule("Fancy", {
				limits: { attachedPercent: 10_000 },
				outsideRowMayBeOpen: false,
				excludes: ["crooked", "stain", "travel-stain"],
			}),
			rule("No. 1", { limits: { soiledPercent: 1250 } }),
			rule("No. 2", { limits: { sealedPercent: 7500 } }),
			rule("No. 3", { limits: { fullWeightPercent: 5000 } }),
		],
	),
}

const national: SchemeTemplate = {
	name: "National rules (Cincinnati, 1913)",
	isVerified: true,
	scheme: sectionScheme("National rules, Cincinnati; American Bee Journal, May 1913 (excerpt).", [
		rule("Fancy", { limits: { unsealedCells: 600 } }),
		rule("No. 1", { limits: { unsealedCells: 4000 } }),
	]),
}

const usda: SchemeTemplate = {
	name: "Names of USDA 1967",
	isVerified: false,
	scheme: {
		...sectionScheme(
			"Names of the United States Standards for Grades of Comb Honey (1967), from memory. Their limits were not verified and are left open: read the standard, then write them here.",
			["U.S. Fancy", "U.S. No. 1", "U.S. No. 1 Mixed Color", "U.S. No. 2"].map((name) => rule(name)),
		),
		forms: ["round", "basswood", "clear-box", "cut-comb", "frame"],
	},
}

/** The schemes a producer may start from, the verified ones first. */
export const schemeTemplates: readonly SchemeTemplate[] = [
	wisconsinSections,
	wisconsinChunk,
	national,
	eastern,
	colorado,
	usda,
]
