import { randomUUID } from "node:crypto"
import { useState } from "react"
import { data, Link, redirect, useNavigate } from "react-router"
import { findLoad } from "~/services/cold-room/find-load.server"
import { LoggerForm } from "~/ui/cold-room/logger-fields"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/load-readings"
import { loadNumber } from "./cold-room-form"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { takeLoggerFile } from "./load-file.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Logger file for load ${params.load} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ params }: Route.LoaderArgs, scope) => {
	const number = loadNumber(params.load)
	const load = number === null ? null : await findLoad({ producerId: scope.producer.id, number })
	if (!load) throw data(null, { status: 404 })
	return {
		frame: await findDeskFrame(scope, { part: "lots" }),
		number: load.number,
		freezer: load.freezer,
		proofId: randomUUID(),
	}
})

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ request, params }: Route.ActionArgs, scope) => {
		const taken = await takeLoggerFile(request, scope, params.load)
		if (taken.ok) throw redirect(taken.href)
		return data({ errors: taken.errors, typed: taken.typed }, { status: taken.status })
	},
)

export default function LoadReadings({ loaderData, actionData, params }: Route.ComponentProps) {
	const { number, freezer, proofId } = loaderData
	const navigate = useNavigate()
	const [errors, setErrors] = useState(actionData?.errors ?? [])
	const page = `/desk/${params.producer}/cold-room/${number}`
	return (
		<DeskBook frame={loaderData.frame} ruled>
			<SheetHead
				title={`Logger file for load ${number}`}
				lead={
					<>
						{freezer}. The longest stretch at or below a row of the freezing table decides; only readings from the
						loading on count. <Link to={page}>Back to the load</Link>
					</>
				}
				note="A freezer log proves temperature at the probe, not in the middle of the case."
			/>
			<ErrorSummary title="Nothing was changed" errors={errors} />
			<LoggerForm
				action={`${page}/readings`}
				proofId={proofId}
				typed={actionData?.typed ?? {}}
				errors={errors}
				onErrors={setErrors}
				onTaken={(href) => navigate(href)}
			/>
		</DeskBook>
	)
}
