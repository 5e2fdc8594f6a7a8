import type { ReactNode } from "react"
import { renderToStaticMarkup } from "react-dom/server"
import { createMemoryRouter, RouterProvider } from "react-router"
import { describe, expect, it } from "vitest"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { QuantityField } from "~/ui/forms/quantity-field"
import { Stepper } from "~/ui/forms/stepper"
import { ErrorPage } from "~/ui/layout/error-page"
import { MessageLine } from "~/ui/layout/sheet"
import { ThumbIndex } from "~/ui/layout/thumb-index"
import { PartsPage } from "~/ui/parts/parts-page"
import { dayBarScale } from "~/ui/stock/day-bar"
import { FillStrip } from "~/ui/stock/fill-strip"

/** The markup as the server sends it: what a person has before, or without, any script. */
function markup(node: ReactNode, at = "/"): string {
	const router = createMemoryRouter([{ path: "*", element: node }], { initialEntries: [at] })
	return renderToStaticMarkup(<RouterProvider router={router} />)
}

describe("a fill strip", () => {
	it("is read out in words", () => {
		const html = markup(
			<FillStrip
				runs={[
					{ state: "free", count: 16 },
					{ state: "held", count: 6 },
				]}
				caption="16 free, 6 held until Friday"
			/>,
		)
		expect(html).toContain('role="img" aria-label="16 free to promise, 6 held"')
		expect(html).toContain('<span class="strip-caption">16 free, 6 held until Friday</span>')
	})

	it("is words when there is nothing, and when nobody counted", () => {
		expect(markup(<FillStrip runs={[]} />)).toBe('<span class="fill-strip note">none left</span>')
		expect(markup(<FillStrip runs={[]} status="not-counted" />)).toContain("not counted")
	})

	it("says when a cell stands for five", () => {
		expect(markup(<FillStrip runs={[{ state: "free", count: 240 }]} caption="240 free" />)).toContain(
			"240 free; one cell is five",
		)
	})
})

describe("a field", () => {
	it("keeps what was typed and is tied to its error", () => {
		const html = markup(<QuantityField name="q11" label="Cases of clover" defaultValue="lots" error="Give a number." />)
		expect(html).toMatch(/<input[^>]*aria-invalid="true"[^>]*aria-describedby="field-q11-error"[^>]*value="lots"/)
		expect(html).toContain('<span class="field-error" id="field-q11-error">Give a number.</span>')
	})

	it("is tied to its hint and its error, in that order", () => {
		const html = markup(<TextField name="email" label="E-mail" hint="Yours." error="Not an address." />)
		expect(html).toContain('aria-describedby="field-email-hint field-email-error"')
		expect(html).toContain('<label class="field-label" for="field-email">E-mail</label>')
	})

	it("is linked from the summary of errors", () => {
		const html = markup(
			<ErrorSummary errors={[{ field: "q11", message: "Give a number." }, { message: "Not saved." }]} />,
		)
		expect(html).toContain('role="alert"')
		expect(html).toContain('<a href="#field-q11">Give a number.</a>')
		expect(html).toContain("<li>Not saved.</li>")
		expect(markup(<ErrorSummary errors={[]} />)).toBe("")
	})
})

describe("without a script", () => {
	it("the steps of a stepper are posts of its form", () => {
		const html = markup(<Stepper name="p11" label="Round section" defaultValue={0} max={9} />)
		expect(html).toMatch(/<button type="submit" value="less:p11"[^>]*disabled="" name="step">/)
		expect(html).toMatch(/<button type="submit" value="more:p11"[^>]* name="step">/)
	})

	it("More opens the later parts of the book", () => {
		const tabs = ["To do", "Orders", "Sharing", "Packing", "Lots"].map((label) => ({
			label,
			to: `/${label}`,
			current: label === "Lots",
		}))
		const html = markup(<ThumbIndex tabs={tabs} account={{ name: "Ida", signOutAction: "/sign-out" }} />)
		const more = html.slice(html.indexOf("<details"))
		expect(more).toContain('<summary class="thumb-tab is-current">More</summary>')
		expect(more).toMatch(/<a aria-current="page"[^>]*>Lots<\/a>/)
		expect(more).not.toContain("Packing")
		expect(more).toMatch(/<form[^>]*action="\/sign-out" method="post"/)
	})
})

describe("a button", () => {
	it("that cannot be pressed says why", () => {
		const html = markup(<Button disabledReason="waits on lot C14">Confirm</Button>)
		const reason = /aria-describedby="([^"]+)"/.exec(html)?.[1]
		expect(html).toContain(`id="${reason}">waits on lot C14</span>`)
		expect(html).toContain("disabled")
	})

	it("keeps both labels while busy, and reads one", () => {
		const html = markup(
			<Button busy busyLabel="Confirming…">
				Confirm
			</Button>,
		)
		expect(html).toContain('aria-busy="true"')
		expect(html).toMatch(/<span class="invisible">Confirm<\/span><span aria-hidden="false">Confirming…<\/span>/)
	})
})

describe("a message", () => {
	it("is an alert when something went wrong, and a status otherwise", () => {
		expect(markup(<MessageLine tone="problem" title="Could not save." />)).toContain('role="alert"')
		expect(markup(<MessageLine tone="saved" title="Saved." />)).toContain('role="status"')
	})
})

describe("an error page", () => {
	const thrown = (status: number) => ({ status, statusText: "", internal: false, data: "column secret_token" })

	it("tells nothing about what is not there", () => {
		const html = markup(<ErrorPage error={thrown(404)} />)
		expect(html).toContain("There is nothing here")
		expect(html).not.toContain("secret_token")
	})

	it("offers to load the same address again, by a plain link", () => {
		const html = markup(<ErrorPage error={thrown(503)} />, "/desk/larkmoor?day=2026-08-18")
		expect(html).toContain('href="/desk/larkmoor?day=2026-08-18">Load this page again</a>')
	})

	it("has its own words for each refusal", () => {
		const titles = [400, 403, 413, 429, 500, 503].map(
			(status) => /<h1[^>]*>([^<]+)/.exec(markup(<ErrorPage error={thrown(status)} />))?.[1],
		)
		expect(new Set(titles).size).toBe(6)
		expect(titles).toContain("This page could not be made")
	})
})

describe("the bars of the ribbon", () => {
	it("fit the fullest day, and stay small on quiet weeks", () => {
		expect(dayBarScale([{ promised: 40, free: 36.5 }, { free: 2 }])).toBe(1)
		expect(dayBarScale([{ free: 3 }])).toBe(4)
		expect(dayBarScale([])).toBe(4)
	})
})

describe("every part", () => {
	it("carries no style attribute, which the policy of the page forbids", () => {
		const html = markup(<PartsPage />)
		expect(html).toContain("Parts of the book")
		expect(html).not.toMatch(/ style=/)
	})
})
