import { PartsPage } from "~/ui/parts/parts-page"
import { admits, guard } from "./guard.server"

export const meta = () => [{ title: "Parts of the book · Waxbill" }]

export const loader = guard(admits.anyone, () => null)

export default function Parts() {
	return <PartsPage />
}
