import { Link } from "react-router"
import type { GradeScheme } from "~/domain/grading/grade-comb"
import { EmptyLine } from "~/ui/layout/sheet"
import { FORM_WORDS } from "./scheme-form"

type Named = { name: string; scheme: GradeScheme }

function SchemeRows({ title, rows }: { title: string; rows: readonly (Named & { to: string; state?: string })[] }) {
	return (
		<table className="sheet-table mb-6">
			<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">{title}</caption>
			<thead>
				<tr>
					<th scope="col">Scheme</th>
					<th scope="col">Grades</th>
					<th scope="col" className="max-desk:hidden pr-4! desk:pr-8!">
						For
					</th>
				</tr>
			</thead>
			<tbody>
				{rows.map(({ name, scheme, to, state }) => (
					<tr key={name}>
						<td>
							<Link className="inline-block py-1 font-semibold" to={to}>
								{name}
							</Link>
							{state && <span className="note block">{state}</span>}
						</td>
						<td>{scheme.grades.map((grade) => grade.name).join(", ")}</td>
						<td className="max-desk:hidden pr-4! desk:pr-8!">
							{scheme.forms.map((form) => FORM_WORDS[form].toLowerCase()).join(", ")}
						</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

/** The producer's schemes, and the published ones to start from. */
export function SchemeList({
	schemes,
	templates,
}: {
	schemes: readonly (Named & { id: string })[]
	templates: readonly (Named & { isVerified: boolean })[]
}) {
	const left = templates.filter(({ name }) => !schemes.some((scheme) => scheme.name === name))
	return (
		<>
			{schemes.length === 0 ? (
				<EmptyLine>No scheme is yours yet: lots are graded by the published ones below.</EmptyLine>
			) : (
				<SchemeRows title="You grade by" rows={schemes.map((scheme) => ({ ...scheme, to: `?scheme=${scheme.id}` }))} />
			)}
			{left.length > 0 && (
				<SchemeRows
					title="Published, to start from"
					rows={left.map((template) => ({
						...template,
						to: `?${new URLSearchParams({ from: template.name })}`,
						state: template.isVerified ? "limits read at the source" : "limits not verified, left open",
					}))}
				/>
			)}
			<p className="px-4 pb-5 desk:px-8">
				<Link className="inline-block py-1" to="?from=">
					Write a scheme of your own
				</Link>
			</p>
		</>
	)
}
