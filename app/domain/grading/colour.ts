/**
 * A band of honey colour: up to and with `upToTenths` of a millimetre Pfund, and `upToDensity` in ten-thousandths of
 * optical density; the last band is open.
 */
type ColourBand = { name: string; upToTenths: number; upToDensity: number }

/** USDA, United States Standards for Grades of Extracted Honey, effective May 23, 1985, colour table. */
const USDA_BANDS: readonly ColourBand[] = [
	{ name: "Water White", upToTenths: 80, upToDensity: 945 },
	{ name: "Extra White", upToTenths: 170, upToDensity: 1890 },
	{ name: "White", upToTenths: 340, upToDensity: 3780 },
	{ name: "Extra Light Amber", upToTenths: 500, upToDensity: 5950 },
	{ name: "Light Amber", upToTenths: 850, upToDensity: 13_890 },
	{ name: "Amber", upToTenths: 1140, upToDensity: 30_080 },
	{ name: "Dark Amber", upToTenths: Number.POSITIVE_INFINITY, upToDensity: Number.POSITIVE_INFINITY },
]

function requireReading(reading: number): void {
	if (!Number.isFinite(reading) || reading < 0) throw new RangeError(`not a colour reading: ${reading}`)
}

function bandBy(reading: number, limit: (band: ColourBand) => number): string {
	requireReading(reading)
	return (USDA_BANDS.find((band) => reading <= limit(band)) as ColourBand).name
}

/**
 * The USDA name of a honey's colour from its Pfund reading in tenths of a millimetre; a reading on a boundary has the
 * lighter name. Throws RangeError below zero. Source: USDA, Grades of Extracted Honey (1985), colour table.
 */
export function colourByPfund(pfundTenths: number): string {
	return bandBy(pfundTenths, (band) => band.upToTenths)
}

/**
 * The USDA name of a honey's colour from its optical density in ten-thousandths (945 is 0.0945); a reading on a boundary
 * has the lighter name. Throws RangeError below zero. Source: as `colourByPfund`.
 */
export function colourByDensity(densityTenThousandths: number): string {
	return bandBy(densityTenThousandths, (band) => band.upToDensity)
}
