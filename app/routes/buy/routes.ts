import { type RouteConfigEntry, route } from "@react-router/dev/routes"

export const buyRoutes: RouteConfigEntry[] = [
	route("buy/:producer", "routes/buy/stores.tsx"),
	route("buy/:producer/:store", "routes/buy/store.tsx"),
	route("buy/:producer/:store/sheet", "routes/buy/next-sheet.tsx"),
	route("buy/:producer/:store/sheet/:day", "routes/buy/sheet.tsx"),
	route("buy/:producer/:store/orders/:number", "routes/buy/order.tsx"),
	route("buy/:producer/:store/deliveries", "routes/buy/deliveries.tsx"),
	route("buy/:producer/:store/standing", "routes/buy/standing.tsx"),
	route("buy/:producer/:store/standing/year", "routes/buy/standing-year.tsx"),
	route("buy/:producer/:store/invoices", "routes/buy/invoices.tsx"),
	route("buy/:producer/:store/invoices/:invoice", "routes/buy/invoice.tsx"),
	route("buy/:producer/:store/invoices/:invoice.pdf", "routes/buy/invoice-pdf.tsx"),
	route("buy/:producer/:store/prices", "routes/buy/prices.tsx"),
	route("buy/:producer/:store/prices.csv", "routes/buy/prices-csv.ts"),
	route("buy/:producer/:store/prices.pdf", "routes/buy/prices-pdf.ts"),
	route("buy/:producer/:store/details", "routes/buy/details.tsx"),
]
