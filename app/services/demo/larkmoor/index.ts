import type { DemoScenario } from "../scenario"
import { larkmoorYards } from "./crop"
import { larkmoorProducts } from "./products"
import { larkmoorStores } from "./stores"

/** The main producer of the demo: twelve stores, two rounds of the van, two markets and a whole season. */
export const larkmoor: DemoScenario = {
	seed: 20_418,
	slug: "larkmoor",
	name: "Larkmoor Bee Yard",
	county: "Teasel County",
	timeZone: "America/New_York",
	settings: {
		address: "Weld Lane, Teasel County",
		email: "orders@larkmoor.example.test",
		phone: "(555) 010-0142",
		shopHeadline: "The clover comb is off the hives.",
		shopWords:
			"Comb honey is honey left in the wax the bees sealed it in. We cut it, weigh it, freeze it two days and box it. Nothing is strained and nothing is warmed. When this year’s is gone there is no more until June.",
		invoiceNote:
			"Keep comb cool and flat, out of the sun. Every section was frozen 48 hours at 0 °F before packing. Tell us within two days of any that arrived broken; we replace it or take it off this invoice.",
		contactName: "Ida",
	},
	tiers: [
		{ name: "Shops", percent: 100 },
		{ name: "Cheese counters", percent: 97 },
		{ name: "Kitchens", percent: 104 },
	],
	products: larkmoorProducts,
	rounds: [
		{ name: "Tuesday round, town and quay", weekday: 2, cutoffDaysBefore: 4, cutoffTime: "12:00" },
		{ name: "Friday round, mills and market hall", weekday: 5, cutoffDaysBefore: 2, cutoffTime: "12:00" },
	],
	stores: larkmoorStores,
	yards: larkmoorYards,
	members: [
		{ email: "ida@larkmoor.example.test", role: "owner" },
		{ email: "bram@larkmoor.example.test", role: "desk" },
		{ email: "wilf@larkmoor.example.test", role: "packer" },
		{ email: "june@larkmoor.example.test", role: "stall" },
		{ email: "kit@nettleandquince.example.test", role: "stall" },
		{ email: "rosa@pantryandplume.example.test", role: "buyer", store: "pantry-and-plume" },
		{ email: "tobias@pantryandplume.example.test", role: "payer", store: "pantry-and-plume" },
		{ email: "mara@mossgate.example.test", role: "buyer", store: "mossgate-grocers" },
		{ email: "kit@nettleandquince.example.test", role: "buyer", store: "nettle-and-quince" },
	],
	ownerEmail: "ida@larkmoor.example.test",
	deskEmail: "bram@larkmoor.example.test",
	packerEmail: "wilf@larkmoor.example.test",
	invitations: [
		{ email: "june@larkmoor.example.test", name: "June Fennimore", role: "stall", wasAccepted: true },
		{
			email: "ada@ferrylane.example.test",
			name: "Ada Winnow",
			role: "buyer",
			store: "ferry-lane-co-op",
			wasAccepted: false,
		},
		{ email: "piet@larkmoor.example.test", name: "Piet Sorrel", role: "packer", wasAccepted: false },
	],
	markets: [
		{
			name: "Coopers Green Market",
			address: "Coopers Green, Teasel County",
			opensAt: "09:00",
			closesAt: "13:00",
			readerId: "tmr_demo_stall",
			weekdayAhead: 0,
			people: ["june@larkmoor.example.test"],
			load: { "11": 16, "21": 8, "31": 14, "41": 12, "42": 10, "51": 9 },
		},
		{
			name: "Lantern Wharf Market",
			address: "Lantern Wharf, Lower Saltern",
			opensAt: "15:00",
			closesAt: "19:00",
			readerId: "tmr_demo_stall_2",
			weekdayAhead: 3,
			people: ["kit@nettleandquince.example.test"],
			load: { "11": 12, "31": 10, "41": 8, "42": 8, "51": 6 },
		},
	],
	comingOrders: [
		{
			store: "thornback-cheese-counter",
			openDay: -1,
			state: "packed",
			lines: [
				{ code: "11", cases: 2 },
				{ code: "22", cases: 1 },
			],
			hoursAgo: 70,
		},
		{
			store: "ferry-lane-co-op",
			openDay: -1,
			state: "confirmed",
			lines: [
				{ code: "21", cases: 4, given: 3 },
				{ code: "51", cases: 2 },
			],
			hoursAgo: 66,
		},
		{ store: "the-brass-whisk", openDay: -1, state: "confirmed", lines: [{ code: "41", cases: 2 }], hoursAgo: 60 },
		{
			store: "wren-street-larder",
			openDay: 0,
			state: "placed",
			lines: [
				{ code: "11", cases: 3 },
				{ code: "21", cases: 8, isToShare: true },
			],
			hoursAgo: 26,
			note: "The basswood is for the anniversary window. Whatever you can spare.",
		},
		{
			store: "thornback-cheese-counter",
			openDay: 0,
			state: "placed",
			lines: [
				{ code: "41", cases: 4 },
				{ code: "51", cases: 2 },
			],
			hoursAgo: 20,
			poNumber: "TB-4471",
		},
		{
			store: "the-brass-whisk",
			openDay: 0,
			state: "placed",
			lines: [{ code: "31", cases: 2 }],
			hoursAgo: 5,
		},
		{
			store: "ferry-lane-co-op",
			openDay: 0,
			state: "confirmed",
			lines: [
				{ code: "42", cases: 2 },
				{ code: "51", cases: 3 },
			],
			hoursAgo: 30,
		},
		{
			store: "pantry-and-plume",
			openDay: 1,
			state: "cancelled",
			lines: [{ code: "51", cases: 2 }],
			hoursAgo: 28,
			note: "Ordered twice by mistake.",
		},
		{
			store: "ferry-lane-co-op",
			openDay: 1,
			state: "placed",
			lines: [
				{ code: "11", cases: 2 },
				{ code: "51", cases: 1 },
			],
			hoursAgo: 3,
		},
		{
			store: "wren-street-larder",
			openDay: 2,
			state: "placed",
			lines: [{ code: "41", cases: 2 }],
			hoursAgo: 2,
		},
		// A short day far enough ahead to be shared out at leisure.
		...[
			{ store: "ferry-lane-co-op", cases: 6, least: 2, hoursAgo: 47 },
			{ store: "thornback-cheese-counter", cases: 5, least: 2, hoursAgo: 46 },
			{ store: "the-brass-whisk", cases: 4, least: 3, hoursAgo: 44 },
			{ store: "wren-street-larder", cases: 2, least: 1, hoursAgo: 27 },
		].map(({ store, cases, least, hoursAgo }) => ({
			store,
			openDay: 3,
			state: "placed" as const,
			lines: [{ code: "21", cases, least, isToShare: true }],
			hoursAgo,
		})),
	],
	seasonWeeks: 24,
	marketWeeks: 6,
}
