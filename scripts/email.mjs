// Shows every letter with made-up data in the browser: npm run email [-- <port>]
// Each request draws the letter anew in a process of its own, so a changed template shows on reload.
import { execFile } from "node:child_process"
import { createServer } from "node:http"
import { fileURLToPath } from "node:url"

const root = fileURLToPath(new URL("..", import.meta.url))
const types = { html: "text/html; charset=utf-8", text: "text/plain; charset=utf-8", file: "application/pdf" }

/** Runs the drawing process; answers its output, or null for a letter or file that does not exist. */
function draw(...args) {
	return new Promise((resolve, reject) => {
		const options = { cwd: root, encoding: "buffer", maxBuffer: 32 * 1024 * 1024 }
		execFile(
			process.execPath,
			["--import", "tsx", "scripts/email-preview.tsx", ...args],
			options,
			(error, stdout, stderr) => {
				if (!error) resolve(stdout)
				else if (error.code === 4) resolve(null)
				else reject(new Error(stderr.toString() || error.message))
			},
		)
	})
}

const escapeHtml = (text) => text.replace(/[&<>"]/g, (sign) => `&#${sign.charCodeAt(0)};`)

const page = (
	title,
	body,
) => `<!doctype html><html lang="en-US"><meta charset="utf-8"><title>${escapeHtml(title)}</title>
<style>body{font:16px/1.5 Arial,sans-serif;margin:24px;background:#ebe5d7;color:#2c1812}a{color:#1d5a45}
.side{display:flex;gap:24px;flex-wrap:wrap;align-items:start}iframe{border:0;height:80vh;background:#fff}
li{margin:4px 0}</style><h1>${escapeHtml(title)}</h1>${body}</html>`

async function listPage() {
	const letters = JSON.parse(await draw("list"))
	const items = letters.map(({ name, subject }) => `<li><a href="/${name}">${name}</a>: ${escapeHtml(subject)}</li>`)
	return page("Letters", `<ul>${items.join("")}</ul>`)
}

function letterPage(name) {
	const frame = (view, width) =>
		`<iframe src="/${name}/${view}" width="${width}" title="${view}, ${width} wide"></iframe>`
	const file = name === "invoice" ? frame("file", 820) : ""
	return page(
		name,
		`<p><a href="/">All letters</a></p><div class="side">${frame("html", 600)}${frame("html", 375)}${frame("text", 600)}${file}</div>`,
	)
}

const server = createServer(async (request, response) => {
	const send = (status, type, body) => response.writeHead(status, { "content-type": type }).end(body)
	const [name, view, ...rest] = new URL(request.url ?? "/", "http://preview").pathname.split("/").slice(1)
	try {
		if (!name) return send(200, types.html, await listPage())
		if (!/^[a-z-]+$/.test(name) || rest.length > 0) return send(404, types.text, "There is no such page.")
		if (!view) return send(200, types.html, letterPage(name))
		const drawn = Object.hasOwn(types, view) ? await draw(view, name) : null
		if (drawn === null) return send(404, types.text, "There is no such letter or file.")
		return send(200, types[view], drawn)
	} catch (error) {
		return send(500, types.text, error.message)
	}
})

const port = Number(process.argv[2] ?? 0)
if (!Number.isInteger(port) || port < 0 || port > 65535) {
	console.error(`"${process.argv[2]}" is not a port. Write a number up to 65535, or none to take a free one.`)
	process.exit(1)
}
server.on("error", (error) => {
	console.error(
		error.code === "EADDRINUSE" ? `Port ${port} is taken. Name another, or none to take a free one.` : error.message,
	)
	process.exit(1)
})
server.listen(port, "127.0.0.1", () => {
	console.log(`The letters are at http://127.0.0.1:${server.address().port}/ (Ctrl-C stops)`)
})
