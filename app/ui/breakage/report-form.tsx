import { type Day, dayWords } from "~/domain/calendar"
import { piecesWords } from "~/domain/quantity"
import { Button } from "~/ui/forms/button"
import { describedBy, FieldError, fieldId } from "~/ui/forms/field-error"
import { TextField } from "~/ui/forms/fields"

/** What was typed, by the name of the field; `kept` holds photos that came with a form that was not taken. */
export type TypedReport = {
	reportId: string
	fields: Record<string, string>
	kept: Record<string, string[]>
}

type Line = {
	id: string
	code: string
	name: string
	detail: string
	sentPieces: number
	leftPieces: number
	until: Day
}

type ReportFormProps = {
	producerName: string
	/** Lines of which something can be reported. */
	lines: readonly Line[]
	reportId: string
	typed: TypedReport | null
	errors: readonly { field?: string; message: string }[]
	mostPhotos: number
}

/** Which pieces of a delivery arrived broken, line by line, with photos. Works without a script: it is sent as one form. */
export function ReportForm({ producerName, lines, reportId, typed, errors, mostPhotos }: ReportFormProps) {
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	return (
		<form className="breakage-form" method="post" encType="multipart/form-data" noValidate aria-label="Broken comb">
			<input type="hidden" name="reportId" value={typed?.reportId ?? reportId} />
			{lines.map((line) => (
				<ReportLine key={line.id} line={line} typed={typed} errorOf={errorOf} mostPhotos={mostPhotos} />
			))}
			<div className="breakage-foot">
				<TextField
					name="note"
					label="About the whole delivery"
					maxLength={1000}
					defaultValue={typed?.fields.note}
					hint="How it stood when you opened it, if it helps."
					error={errorOf("note")}
				/>
				<p className="field-hint">
					Photos are made smaller and lose the place and time a phone writes into them. All together at most 60 MB.
				</p>
				<div>
					<Button variant="primary">Report it to {producerName}</Button>
				</div>
			</div>
		</form>
	)
}

type ReportLineProps = {
	line: Line
	typed: TypedReport | null
	errorOf: (field: string) => string | undefined
	mostPhotos: number
}

function ReportLine({ line, typed, errorOf, mostPhotos }: ReportLineProps) {
	const { id, name, code, detail, leftPieces, sentPieces, until } = line
	const kept = typed?.kept[id] ?? []
	return (
		<fieldset className="breakage-line">
			<legend>
				<span className="fig text-ink-faint">{code}</span> <span className="name">{name}</span>
			</legend>
			<p className="note">
				{detail && `${detail}. `}
				{piecesWords(sentPieces)} sent
				{leftPieces < sentPieces && `, ${leftPieces} not reported yet`}. Until {dayWords(until)}.
			</p>
			<div className="breakage-fields">
				<TextField
					name={`pieces-${id}`}
					label="Pieces broken"
					inputMode="numeric"
					autoComplete="off"
					className="w-24"
					defaultValue={typed?.fields[`pieces-${id}`]}
					error={errorOf(`pieces-${id}`)}
				/>
				<TextField
					name={`note-${id}`}
					label="What is broken"
					maxLength={500}
					defaultValue={typed?.fields[`note-${id}`]}
					error={errorOf(`note-${id}`)}
				/>
				<PhotoField lineId={id} kept={kept} mostPhotos={mostPhotos} error={errorOf(`photos-${id}`)} />
			</div>
		</fieldset>
	)
}

function PhotoField(field: { lineId: string; kept: readonly string[]; mostPhotos: number; error?: string }) {
	const { lineId, kept, mostPhotos, error } = field
	const name = `photos-${lineId}`
	const id = fieldId(name)
	return (
		<div className="field">
			<label className="field-label" htmlFor={id}>
				{kept.length > 0 ? "More photos" : "Photos"}
			</label>
			<input
				className="weigh-file"
				type="file"
				id={id}
				name={name}
				multiple
				accept="image/jpeg,image/png,image/webp"
				aria-invalid={error ? true : undefined}
				aria-describedby={describedBy(`${id}-hint`, error && `${id}-error`)}
			/>
			<span className="field-hint" id={`${id}-hint`}>
				Up to {mostPhotos}: JPEG, PNG or WebP, 10 MB each.
			</span>
			{error && <FieldError id={`${id}-error`}>{error}</FieldError>}
			{kept.map((photo, index) => (
				<div className="check" key={photo.slice(-40)}>
					<input type="checkbox" id={`${id}-kept-${index}`} name={`kept-${lineId}`} value={photo} defaultChecked />
					<label htmlFor={`${id}-kept-${index}`}>Photo {index + 1} is kept; untick it to leave it out</label>
				</div>
			))}
		</div>
	)
}
