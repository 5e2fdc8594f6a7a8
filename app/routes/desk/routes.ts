import { type RouteConfigEntry, route } from "@react-router/dev/routes"

export const deskRoutes: RouteConfigEntry[] = [
	route("desk/:producer", "routes/desk/to-do.tsx"),
	route("desk/:producer/orders", "routes/desk/orders.tsx"),
	route("desk/:producer/orders/:number", "routes/desk/order.tsx"),
	route("desk/:producer/packing", "routes/desk/packing.tsx"),
	route("desk/:producer/crop", "routes/desk/crop.tsx"),
	route("desk/:producer/crop/checks", "routes/desk/check.ts"),
	route("desk/:producer/crop/yards/:yard", "routes/desk/yard-round.tsx"),
	route("desk/:producer/crop/supers/:super", "routes/desk/super.tsx"),
	route("desk/:producer/crop/photos/:photo", "routes/desk/super-photo.ts"),
	route("desk/:producer/lots", "routes/desk/lots.tsx"),
	route("desk/:producer/lots/:code", "routes/desk/lot.tsx"),
	route("desk/:producer/invoices", "routes/desk/invoices.tsx"),
	route("desk/:producer/invoices/:invoice", "routes/desk/invoice.tsx"),
	route("desk/:producer/invoices/:invoice.pdf", "routes/desk/invoice-pdf.tsx"),
	route("desk/:producer/stores", "routes/desk/stores.tsx"),
	route("desk/:producer/prices", "routes/desk/prices.tsx"),
	route("desk/:producer/people", "routes/desk/people.tsx"),
]
