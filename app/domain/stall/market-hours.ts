/** When a market is open, as people say it: "09:00:00" and "13:30:00" are "9 to 1:30". */
export function marketHours({ opensAt, closesAt }: { opensAt: string; closesAt: string }): string {
	return `${clock(opensAt)} to ${clock(closesAt)}`
}

function clock(time: string): string {
	const [hour = 0, minute = 0] = time.split(":").map(Number)
	const twelve = hour % 12 || 12
	return minute === 0 ? String(twelve) : `${twelve}:${String(minute).padStart(2, "0")}`
}
