import { redirect } from "react-router"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/store"

/** A store's book opens at its order sheet. */
export const loader = guard(admits.store("buyer", "payer"), ({ params }: Route.LoaderArgs) => {
	throw redirect(`/buy/${params.producer}/${params.store}/sheet`)
})
