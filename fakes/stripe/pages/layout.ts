const entities: Record<string, string> = { "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;", "'": "&#39;" }

/** Text made safe to stand in HTML, between tags or in a quoted attribute. */
export function escapeHtml(text: string): string {
	return text.replace(/[&<>"']/g, (character) => entities[character] ?? character)
}

const style = `
*{box-sizing:border-box}
body{margin:0;background:#eef1f4;color:#1c2733;font:1rem/1.5 system-ui,sans-serif}
.bar{background:#1c2733;color:#fff;padding:.6rem 1rem;text-align:center}
main{max-width:34rem;margin:1.5rem auto;padding:1.5rem;background:#fff;border:1px solid #c5ced8;border-radius:6px}
h1{margin:0 0 .25rem;font-size:1.4rem}h2{margin:0 0 .5rem;font-size:1.15rem}
table{width:100%;border-collapse:collapse;margin:1rem 0}
th,td{text-align:left;padding:.35rem .25rem;border-bottom:1px solid #dde3e9;font-variant-numeric:tabular-nums}
td:last-child,th:last-child{text-align:right}
.sum{font-size:1.8rem;font-weight:600}
.sum .hint{display:inline;font-size:1rem}
details{margin-top:1.5rem}
label{display:block;margin-top:1rem;font-weight:600}
.hint{display:block;font-weight:400;color:#4a5866}
.wrong{display:block;color:#a1130f;font-weight:600}
input{width:100%;min-height:44px;margin-top:.25rem;padding:.5rem .6rem;font:inherit;border:1px solid #66737f;border-radius:4px}
input[aria-invalid=true]{border:2px solid #a1130f}
.pair{display:grid;grid-template-columns:1fr 1fr;gap:1rem}
button{min-height:44px;padding:.6rem 1.2rem;font:inherit;font-weight:600;color:#fff;background:#175a9c;border:0;border-radius:4px;cursor:pointer}
button.plain{color:#1c2733;background:#fff;border:1px solid #66737f}
.actions{display:flex;flex-wrap:wrap;gap:.75rem;margin-top:1.5rem}
:focus-visible{outline:3px solid #e08a00;outline-offset:2px}
.alert{padding:.75rem 1rem;margin:1rem 0;border-left:5px solid #a1130f;background:#fdf0ef}
.reader{padding-top:1rem;margin-top:1rem;border-top:1px solid #c5ced8}
a{color:#175a9c}code{font-size:1rem}`

/** A whole page around `body`, which is HTML already. The bar says on every page that no money moves. */
export function layout(title: string, body: string): string {
	return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escapeHtml(title)}</title>
<style>${style}</style>
</head>
<body>
<header class="bar">Test payments – no money moves</header>
<main>
${body}
</main>
</body>
</html>`
}

/** A page with one sentence and, if there is somewhere to go, one link. */
export function messagePage(title: string, sentence: string, link?: { href: string; text: string }): string {
	const way = link ? `<p><a href="${escapeHtml(link.href)}">${escapeHtml(link.text)}</a></p>` : ""
	return layout(title, `<h1>${escapeHtml(title)}</h1>\n<p>${escapeHtml(sentence)}</p>\n${way}`)
}
