import type { ReactNode } from "react"
import { Link } from "react-router"
import { Icon } from "~/ui/icons"

type Signal = { state: "none" | "sending" | "sent" | "refused"; text: string; href?: string }

type StallFrameProps = {
	title: string
	/** A title that stands on the page only for those who cannot see it. */
	hideTitle?: boolean
	signal?: Signal
	back?: { to: string; label: string }
	/** The sum that this page is about, beside the title. */
	figure?: string
	children: ReactNode
}

/** What the phone has not sent yet, or the server would not take. Nothing is shown while all is well. */
function SignalBar({ state, text, href }: Signal) {
	const inside = (
		<>
			<Icon
				name={state === "none" ? "no-signal" : state === "sent" ? "tick" : state === "refused" ? "cross" : "signal"}
				size={22}
			/>
			<span>{text}</span>
			{href && <u>See</u>}
		</>
	)
	const className = `signal-bar ${state}`
	return (
		<div role={state === "refused" ? "alert" : "status"}>
			{href ? (
				<Link className={className} to={href}>
					{inside}
				</Link>
			) : (
				<div className={className}>{inside}</div>
			)}
		</div>
	)
}

/** A page of the stall: sun mode always on, one column, large targets, the signal bar on top. */
export function StallFrame({ title, hideTitle = false, signal, back, figure, children }: StallFrameProps) {
	return (
		<div className="stall" data-mode="sun">
			<div className="stall-page">
				{signal && <SignalBar {...signal} />}
				<main id="sheet" tabIndex={-1}>
					{hideTitle ? (
						<h1 className="sr-only">{title}</h1>
					) : (
						<div className="stall-bar">
							{back && (
								<Link to={back.to} aria-label={back.label}>
									<Icon name="left" size={26} />
								</Link>
							)}
							<h1>{title}</h1>
							{figure && <span className="fig">{figure}</span>}
						</div>
					)}
					{children}
				</main>
			</div>
		</div>
	)
}
