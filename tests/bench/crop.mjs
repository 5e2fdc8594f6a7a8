import { join } from "node:path"
import { quietly } from "../../scripts/lib/commands.mjs"
import { writeSeasons } from "./seasons.mjs"

const SCALES = [1, 4, 16]
const LOOKS = 15
const WARM_UP = 4
const AIM_MS = 100
const LOGGER_AIM = { ms: 5000, megabytes: 150 }
const SHARING_AIM_MS = 20
const CUT_OFF_AIM_MS = 20_000
const DESK_AIM_MS = 1_000

/**
 * What a producer with ten seasons waits for, at one, four and sixteen sixteenths of the full size: pages over HTTP on one
 * connection, the rest by service call; the growth is said, and the full size is held against its aim. Then a logger file
 * of a million readings, sharing out 10,000 claims, and the last orders of 2,000 standing orders.
 */
export async function measureCrop({ database, web, cookie, folder, env, ownerEmail, say }) {
	const call = (what, facts) => callService({ folder, env }, what, facts)
	const measured = []
	for (const sixteenths of SCALES) {
		const seasons = await writeSeasons(database, { sixteenths, ownerEmail })
		await database.client.query("vacuum (analyze)")
		const desk = `${web}/desk/${seasons.slug}`
		const { promise, forward, backward } = call("seasons", seasons)
		measured.push({
			"Crop board, page": await medianOfPage(`${desk}/crop`, cookie),
			"Lot, page": await medianOfPage(`${desk}/lots/${seasons.lot}`, cookie),
			"Both traces of a lot, page": await medianOfPage(`${desk}/lots/${seasons.lot}/trace`, cookie),
			"Free to promise for 40 products on each day of 26 weeks, service call": promise,
			"Trace forward, service call": forward,
			"Trace backward, service call": backward,
		})
		say(`Ten seasons at ${sixteenths}/16: ${JSON.stringify(seasons.counts)}`)
		if (sixteenths === SCALES.at(-1)) measured.seasons = seasons
	}
	const rows = Object.keys(measured[0]).map((name) => {
		const times = measured.map((of) => of[name])
		say(`${name}: ${growthWords(times)} ms at 1, 4 and 16 times the data`)
		return aimRow(name, "ms, median", times.at(-1), AIM_MS)
	})
	const logger = call("logger", measured.seasons)
	return [
		...rows,
		aimRow("Logger file of 1,000,000 readings", "ms", logger.ms, LOGGER_AIM.ms),
		aimRow("Logger file of 1,000,000 readings", "MB more", logger.megabytes, LOGGER_AIM.megabytes),
		...sharingRows(call("sharing", {}), say),
		...cutOffRows(call("standing", {}), say),
		...deskRows(call("desk", {})),
	]
}

function sharingRows({ sizes, times, solved, solvedClaims }, say) {
	for (const { rule, ms, solverMs } of solved) {
		say(
			`Exact shares of ${solvedClaims} claims, ${rule}: ${ms.toFixed(1)} ms, HiGHS ${solverMs.toFixed(0)} ms for the same`,
		)
	}
	const full = sizes.indexOf(10_000)
	return times.map(({ rule, of, ms }) => {
		const name = `Sharing out 10,000 claims, ${rule}, ${of}`
		say(`${name}: ${growthWords(ms)} ms for ${sizes.join(", ")} claims`)
		return aimRow(name, "ms, median", ms[full], SHARING_AIM_MS)
	})
}

function cutOffRows({ stores, ms: { one, two } }, say) {
	const name = `Last orders of ${stores.toLocaleString("en-US")} standing orders`
	say(`${name}: ${Math.round(one)} ms with one worker, ${Math.round(two)} ms with two`)
	return [aimRow(`${name}, one worker`, "ms", one, CUT_OFF_AIM_MS), aimRow(`${name}, two workers`, "ms", two, one)]
}

function deskRows({ stores, toDo, season }) {
	const open = `${stores.toLocaleString("en-US")} open orders and as many standing ones`
	return [
		aimRow(`To do with ${open}, service call`, "ms, median", toDo, DESK_AIM_MS),
		aimRow(`The season with ${open}, service call`, "ms, median", season, DESK_AIM_MS),
	]
}

const growthWords = (times) => times.map((ms) => ms.toFixed(1)).join(", ")

/** Against an aim and not a reference: a ratio of 1 or more is within it. */
function aimRow(name, unit, measured, aim) {
	const ours = Number(measured.toPrecision(4))
	return { name, unit, ours, reference: aim, ratio: Math.round((aim / measured) * 1000) / 1000, floor: 1 }
}

async function medianOfPage(url, cookie) {
	const times = []
	for (let look = 0; look < WARM_UP + LOOKS; look += 1) {
		const began = performance.now()
		const response = await fetch(url, { headers: { cookie }, redirect: "manual" })
		await response.arrayBuffer()
		if (response.status !== 200) throw new Error(`${url} answers ${response.status}.`)
		if (look >= WARM_UP) times.push(performance.now() - began)
	}
	return times.toSorted((a, b) => a - b)[Math.floor(times.length / 2)]
}

function callService({ folder, env }, what, facts) {
	const args = [join(folder, "build/node/services.js"), what, JSON.stringify(facts)]
	const done = quietly(process.execPath, args, { env: { ...env, LOG_LEVEL: "warn" }, maxBuffer: 1e8 })
	if (!done.ok) throw new Error(`measuring ${what} failed:\n${done.output}`)
	return JSON.parse(done.stdout.trim().split("\n").at(-1))
}
