/** Someone to sign in as while trying the product: what they are, in words, and the page where their work begins. */
export type DemoPerson = { name: string; email: string; role: string; path: string }

/** The people of the demo. Mail to example.test goes nowhere; the mail catcher shows their sign-in codes. */
export const demoPeople: readonly DemoPerson[] = [
	{
		name: "Ida Larkmoor",
		email: "ida@larkmoor.example.test",
		role: "owner of Larkmoor Bee Yard",
		path: "/desk/larkmoor",
	},
	{
		name: "Bram Sedgewick",
		email: "bram@larkmoor.example.test",
		role: "desk hand of Larkmoor Bee Yard",
		path: "/desk/larkmoor/orders",
	},
	{
		name: "Wilf Tarrow",
		email: "wilf@larkmoor.example.test",
		role: "packer of Larkmoor Bee Yard",
		path: "/desk/larkmoor/packing",
	},
	{
		name: "June Fennimore",
		email: "june@larkmoor.example.test",
		role: "volunteer at the market stall of Larkmoor Bee Yard",
		path: "/stall/larkmoor",
	},
	{
		name: "Rosa Quill",
		email: "rosa@pantryandplume.example.test",
		role: "buyer of Pantry & Plume, orders from Larkmoor Bee Yard",
		path: "/buy/larkmoor/pantry-and-plume/sheet",
	},
	{
		name: "Tobias Amory",
		email: "tobias@pantryandplume.example.test",
		role: "buyer of Pantry & Plume who also pays its invoices",
		path: "/buy/larkmoor/pantry-and-plume/invoices",
	},
	{
		name: "Mara Lindgate",
		email: "mara@mossgate.example.test",
		role: "buyer of Mossgate Grocers, orders from Larkmoor Bee Yard",
		path: "/buy/larkmoor/mossgate-grocers/sheet",
	},
	{
		name: "Odette Brill",
		email: "odette@tansyknoll.example.test",
		role: "owner of Tansy Knoll Combs, the second producer",
		path: "/desk/tansy-knoll",
	},
	{
		name: "Lena Fairweather",
		email: "lena@orchardgate.example.test",
		role: "buyer of Orchard Gate Farm Shop, orders from Tansy Knoll Combs",
		path: "/buy/tansy-knoll/orchard-gate-farm-shop/sheet",
	},
	{
		name: "Kit Hollin",
		email: "kit@nettleandquince.example.test",
		role: "several roles: buyer of Nettle & Quince, volunteer at Larkmoor's stall, desk hand of Tansy Knoll Combs",
		path: "/buy/larkmoor/nettle-and-quince/standing",
	},
]
