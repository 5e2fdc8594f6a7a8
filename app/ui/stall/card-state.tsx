import { Icon, type IconName } from "~/ui/icons"

/** How a card sale stands, large enough to be seen at arm's length; read out when it changes. */
export function CardState({ icon, words, figure }: { icon: IconName; words: string; figure: string }) {
	return (
		<div className="card-state" role="status">
			<Icon name={icon} size={56} />
			<p>{words}</p>
			<b>{figure}</b>
		</div>
	)
}
