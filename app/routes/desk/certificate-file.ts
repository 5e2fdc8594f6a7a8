import { data } from "react-router"
import { z } from "zod"
import { CERTIFICATE_ENDINGS } from "~/domain/receivables/certificate"
import { findCertificateFile } from "~/services/certificates/find-certificate-file.server"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/certificate-file"

/**
 * The file of a certificate, for a person to save and look at: never shown inside the browser’s own page, of the type that
 * its content had when it came, and under a name that we gave it. Every answer says that its type is as told.
 */
export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, { producer }) => {
	const id = z.guid().safeParse(params.certificate)
	const file = id.success ? await findCertificateFile({ producerId: producer.id, certificateId: id.data }) : null
	if (!file) throw data(null, { status: 404 })
	const name = file.number.replaceAll(/[^A-Za-z0-9]+/g, "-").replaceAll(/^-|-$/g, "") || "certificate"
	return new Response(new Uint8Array(file.content), {
		headers: {
			"Content-Type": file.mediaType,
			"Content-Disposition": `attachment; filename="${name}.${CERTIFICATE_ENDINGS[file.mediaType]}"`,
			"Cache-Control": "private, no-store",
		},
	})
})
