import { casesWords } from "../quantity"
import type { Claim, ClaimClass, Share, SharingRule } from "./share-out"

/** One sharing as it is put into words: what was there, who asked, by which rule, and what came of it. */
export type ToldSharing = {
	supply: number
	rule: SharingRule
	claims: readonly Claim[]
	/** In the order of the claims. */
	shares: readonly Share[]
}

export const RULE_NAMES: Record<SharingRule, string> = {
	"equal-shares": "Equal shares",
	"in-proportion": "In proportion",
	"equal-shortfall": "Equal shortfall",
}

const SMALL = ["none", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten"] as const
const small = (count: number) => SMALL[count] ?? String(count)
const head = (count: number) => small(count).charAt(0).toUpperCase() + small(count).slice(1)

const CLASS_WORDS: Record<ClaimClass, string> = {
	commitment: "commitments made before the season",
	standing: "standing orders",
	single: "single orders",
}

/** Whether all count alike and are served together, so that one figure holds for each of them. */
const isPlain = ({ claims }: ToldSharing) =>
	claims.every(({ weight, claimClass }) => weight === 1 && claimClass === claims[0]?.claimClass)

/** What the rule does, under its name: "Everyone gets the same part of what they asked: 58%." */
export function ruleSentence(told: ToldSharing): string {
	const words = {
		"equal-shares": "One case each, round by round, until they are gone.",
		"in-proportion": `Everyone gets the same part of what they asked${partWords(told)}.`,
		"equal-shortfall": `Everyone goes without the same number${shortfallWords(told)}.`,
	}
	return words[told.rule]
}

/** ": 58%", where one figure holds for all. */
function partWords(told: ToldSharing): string {
	const asked = told.claims.reduce((sum, claim) => sum + claim.asked, 0)
	if (!isPlain(told) || asked <= told.supply || told.supply === 0 || told.shares.some(isAside)) return ""
	return `: ${Math.round((100 * told.supply) / asked)}%`
}

/** ": one or two", where one figure holds for all. */
function shortfallWords(told: ToldSharing): string {
	if (!isPlain(told)) return ""
	const missing = told.shares.map((share, index) => (isAside(share) ? 0 : askedBy(told, index) - share.exact))
	const most = Math.max(0, ...missing)
	if (most === 0) return ""
	const [low, high] = [Math.floor(most), Math.ceil(most)]
	return low === high ? `: ${small(high)}` : `: ${small(low)} or ${small(high)}`
}

const askedBy = ({ claims }: ToldSharing, index: number) => (claims[index] as Claim).asked
const isAside = ({ reason }: Share) => reason === "below-least" || reason === "came-back"

/** Half a case and the like, in at most one decimal: "2.2". */
const exactWords = (exact: number) => String(Math.round(exact * 10) / 10)
const ordinal = (n: number) =>
	`${n}${n % 100 > 10 && n % 100 < 14 ? "th" : ({ 1: "st", 2: "nd", 3: "rd" }[n % 10] ?? "th")}`

/**
 * Why the claim at `index` gets what it gets, as the producer reads it beside its row: "The 18th case: without it, under
 * its least." `last` is what the store got and asked when it was last short, null where it never was.
 */
export function deskReason(told: ToldSharing, index: number, last: { given: number; asked: number } | null): string {
	const claim = told.claims[index] as Claim
	const share = told.shares[index] as Share
	const lastWords = last ? ` Had ${last.given} of ${last.asked} when last short.` : ""
	switch (share.reason) {
		case "whole":
			return claim.least === claim.asked && claim.asked > 1
				? `Takes ${claim.asked} or none.`
				: `Asked ${claim.asked}, gets ${share.given}.`
		case "left-over":
			return leftOverReason(told, { claim, share, last })
		case "below-least":
			return `Takes ${leastWords(claim)}. Its share would be ${exactWords(share.exact)}.`
		case "came-back":
			return "Set aside at first; what was over covers its least."
		case "nothing-left":
			return share.exact > 0
				? `Its share is ${exactWords(share.exact)}: no whole case.${lastWords}`
				: told.supply === 0
					? "None can be ready."
					: noneReason(claim)
		case "shared":
			return share.exact > share.given
				? `Its share is ${exactWords(share.exact)}.${lastWords}`
				: `Its share is ${small(share.given)}.`
	}
}

const noneReason = ({ claimClass }: Claim) =>
	claimClass === "commitment"
		? "Its share is none under this rule."
		: `None is left for ${CLASS_WORDS[claimClass]} under this rule.`

function leftOverReason(
	told: ToldSharing,
	{ claim, share, last }: { claim: Claim; share: Share; last: { given: number; asked: number } | null },
): string {
	const leftOvers = told.shares.filter(({ reason }) => reason === "left-over").length
	const given = told.shares.reduce((sum, one) => sum + one.given, 0)
	const which = leftOvers === 1 ? `The ${ordinal(given)} case` : "A left-over case"
	if (share.given === claim.least) return `${which}: without it, under its least.`
	return last ? `${which}: had ${last.given} of ${last.asked} when last short.` : `${which}: the earlier order.`
}

/** "2 or none", "3 or more, or none". */
const leastWords = ({ least, asked }: Claim) => (least === asked ? `${asked} or none` : `${least} or more, or none`)

/** What a store asked and got, and what was sure of it beforehand, in cases of the whole line. */
export type StoreResult = { asked: number; given: number; sure: number }

/**
 * What the store of the claim at `index` reads: its own figures, and how all were treated, never another store's.
 * "You asked 4 and get 2. We gave one case each until the 18 were gone." `byHand` is the producer's note where the
 * result was set by hand, empty where none was written, and null where the rule decided.
 */
export function storeSentence(told: ToldSharing, index: number, line: StoreResult & { byHand: string | null }): string {
	const { asked, given, sure, byHand } = line
	const got = given === 0 ? "none this time" : given < asked ? String(given) : given === 1 ? "it" : `all ${given}`
	const first = `You asked ${asked} and get ${got}.`
	if (byHand !== null) return `${first} ${handWords(byHand)}`
	if (given === asked) return first
	const sureWords = sure > 0 ? ` ${sure} of them ${sure === 1 ? "was" : "were"} yours already.` : ""
	return `${first}${sureWords} ${howWords(told, index)}`
}

function handWords(note: string): string {
	const words = note.trim()
	if (words === "") return "We set this by hand."
	return /[.!?]$/.test(words) ? `We set this by hand: ${words}` : `We set this by hand: ${words}.`
}

function howWords(told: ToldSharing, index: number): string {
	const { supply } = told
	const claim = told.claims[index] as Claim
	const share = told.shares[index] as Share
	if (supply === 0) return "No more can be ready for this day."
	if (share.reason === "below-least")
		return `You take ${leastWords(claim)}, and your share of the ${supply} would have been less.`
	const rank = (claimClass: ClaimClass) => Object.keys(CLASS_WORDS).indexOf(claimClass)
	const before = told.claims.filter((one) => rank(one.claimClass) < rank(claim.claimClass)).map((one) => one.claimClass)
	const first = [...new Set(before)].sort((a, b) => rank(a) - rank(b)).map((name) => CLASS_WORDS[name])
	const how = howRuleWords(told)
	if (first.length === 0) return how
	const words = first.join(" and ")
	return `${words.charAt(0).toUpperCase()}${words.slice(1)} came first. ${how}`
}

function howRuleWords(told: ToldSharing): string {
	const { supply, rule } = told
	const were = supply === 1 ? "the one case was gone" : `the ${supply} were gone`
	if (rule === "equal-shares") return `We gave one case each until ${were}.`
	if (rule === "in-proportion")
		return `We shared ${casesWords(supply)} so that everyone gets the same part of what they asked${partWords(told)}.`
	return `We shared ${casesWords(supply)} so that everyone goes without the same number${shortfallWords(told)}.`
}

/** What a rule comes to, at the foot of its column. `isGood` when nobody who asked goes without. */
export type Verdict = { isGood: boolean; head: string; line: string }

/** The verdict on a sharing, with the names of those who get none where they are few. In the order of the claims. */
export function verdictOf(told: ToldSharing, names: readonly string[]): Verdict {
	const given = told.shares.reduce((sum, share) => sum + share.given, 0)
	const givenWords = `${given} of ${casesWords(told.supply)} given.`
	const none = told.shares.flatMap((share, index) => (share.given === 0 && askedBy(told, index) > 0 ? [index] : []))
	if (told.supply === 0) return { isGood: false, head: "None can be ready.", line: "Everyone gets none." }
	if (none.length === 0) return { isGood: true, head: reachWords(told.claims.length), line: givenWords }
	const aside = none.filter((index) => told.shares[index]?.reason === "below-least")
	const verb = none.length === 1 ? "gets" : "get"
	const who = none.length <= 2 ? none.map((index) => names[index]).join(" and ") : head(none.length)
	return {
		isGood: false,
		head: aside.length > 0 ? asideWords(aside.length) : `${head(none.length)} ${verb} none.`,
		line: `${who} ${verb} none. ${givenWords}`,
	}
}

const reachWords = (count: number) =>
	count === 1
		? "It reaches its least."
		: count === 2
			? "Both reach their least."
			: `All ${small(count)} reach their least.`

const asideWords = (count: number) =>
	count === 1 ? "One is set aside: under its least." : `${head(count)} are set aside: under their least.`
