import type { TemperatureUnit } from "./freezing"

/** Reads the temperatures of a logger file. One object reads a file through: it allocates nothing for a plain figure. */
export class LoggerFigure {
	/** The figure read last, and the unit of the sign beside it; null where there was none. */
	value = Number.NaN
	unit: TemperatureUnit | null = null

	/** Reads "-18.2", "−18,2" or "-18.2 °C" in `text` from `from` up to `to`. False when there is no figure. */
	read(text: string, from: number, to: number): boolean {
		let at = from
		while (at < to && text.charCodeAt(at) <= 32) at += 1
		const sign = text.charCodeAt(at)
		const isBelow = sign === 45 || sign === 8722
		if (isBelow || sign === 43) at += 1
		let digits = 0
		let value = 0
		let scale = 0
		for (; at < to; at += 1) {
			const code = text.charCodeAt(at)
			if (code >= 48 && code <= 57) {
				value = value * 10 + code - 48
				scale *= 10
				digits += 1
			} else if ((code === 46 || code === 44) && scale === 0) scale = 1
			else break
		}
		if (digits === 0) return false
		this.value = ((isBelow ? -1 : 1) * value) / (scale || 1)
		return this.#readSign(text, at, to)
	}

	#readSign(text: string, from: number, to: number): boolean {
		this.unit = null
		let end = to
		while (end > from && text.charCodeAt(end - 1) <= 32) end -= 1
		if (end === from) return true
		const letter = text.charCodeAt(end - 1) & ~32
		if (letter !== 67 && letter !== 70) return false
		const between = text.slice(from, end - 1).trim()
		if (between !== "" && !/^(?:[°º˚\uFFFD]+|deg)$/i.test(between)) return false
		this.unit = letter === 67 ? "C" : "F"
		return true
	}
}
