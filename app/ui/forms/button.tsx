import { type ComponentProps, type MouseEvent, type ReactNode, useId } from "react"
import { Link } from "react-router"
import { Icon, type IconName } from "~/ui/icons"

type Look = {
	/** One primary button to a view; plain is for what undoes or adds beside it. */
	variant?: "primary" | "second" | "plain"
	size?: "big" | "normal" | "small"
	icon?: IconName
	iconSize?: number
}

const classOf = ({ variant = "second", size = "normal" }: Look, more?: string) =>
	["btn", variant !== "second" && variant, size !== "normal" && size, more].filter(Boolean).join(" ")

type ButtonProps = ComponentProps<"button"> &
	Look & {
		/** It is being done: the button keeps its width and place, and another press does nothing. */
		busy?: boolean
		busyLabel?: ReactNode
		/** Why it cannot be pressed now, in words below it. Disables the button. */
		disabledReason?: ReactNode
	}

/** A button that says what happens. Submits its form unless `type` says otherwise. */
export function Button({
	variant,
	size,
	icon,
	iconSize,
	busy = false,
	busyLabel,
	disabledReason,
	disabled = Boolean(disabledReason),
	className,
	children,
	onClick,
	type = "submit",
	...button
}: ButtonProps) {
	const reasonId = useId()
	const press = (event: MouseEvent<HTMLButtonElement>) => {
		if (busy) event.preventDefault()
		else onClick?.(event)
	}
	const face = (
		<button
			{...button}
			type={type}
			className={classOf({ variant, size }, className)}
			disabled={disabled}
			aria-busy={busy || undefined}
			aria-disabled={busy || undefined}
			aria-describedby={disabledReason ? reasonId : button["aria-describedby"]}
			onClick={press}
		>
			{icon && <Icon name={icon} size={iconSize} />}
			{busyLabel ? (
				<span className="btn-labels">
					<span className={busy ? "invisible" : undefined}>{children}</span>
					<span className={busy ? undefined : "invisible"} aria-hidden={!busy}>
						{busyLabel}
					</span>
				</span>
			) : (
				children
			)}
		</button>
	)
	if (!disabledReason) return face
	return (
		<span className="inline-grid gap-1">
			{face}
			<span className="note text-center" id={reasonId}>
				{disabledReason}
			</span>
		</span>
	)
}

type ButtonLinkProps = ComponentProps<typeof Link> & Look

/** A link that looks like a button: it goes somewhere and changes nothing. */
export function ButtonLink({ variant, size, icon, iconSize, className, children, ...link }: ButtonLinkProps) {
	return (
		<Link {...link} className={classOf({ variant, size }, className)}>
			{icon && <Icon name={icon} size={iconSize} />}
			{children}
		</Link>
	)
}
