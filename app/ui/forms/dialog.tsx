import { type ReactNode, useEffect, useId, useRef } from "react"
import { Link, useNavigate } from "react-router"

type DialogProps = {
	title: string
	/** Where the page goes when the dialog is left: whether it is open stands in the address, so it needs no script. */
	closeHref: string
	children: ReactNode
	/** The buttons; a way back stands after them by itself. */
	actions?: ReactNode
	closeLabel?: string
}

/**
 * A question laid over the sheet, on the browser's own dialog element. Render it when the address asks for it: before the
 * script arrives it stands open in the page, after that it is modal and Escape leaves by `closeHref`.
 */
export function Dialog({ title, closeHref, children, actions, closeLabel = "Leave it" }: DialogProps) {
	const dialog = useRef<HTMLDialogElement>(null)
	const titleId = useId()
	const navigate = useNavigate()
	useEffect(() => {
		const element = dialog.current
		element?.close()
		element?.showModal()
		return () => element?.close()
	}, [])
	return (
		<dialog
			className="dialog"
			open
			ref={dialog}
			aria-labelledby={titleId}
			onCancel={(event) => {
				event.preventDefault()
				navigate(closeHref, { preventScrollReset: true })
			}}
		>
			<h2 className="name" id={titleId}>
				{title}
			</h2>
			<div className="mt-2 text-body">{children}</div>
			<div className="mt-4 flex flex-wrap gap-3">
				{actions}
				<Link className="btn" to={closeHref} preventScrollReset>
					{closeLabel}
				</Link>
			</div>
		</dialog>
	)
}
