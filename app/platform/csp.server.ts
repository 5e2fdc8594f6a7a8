type CspOptions = {
	/** Made anew for each answer. */
	nonce: string
	/** The page that takes card payments, where it is not Stripe's own: its scheme, host and port. */
	paymentOrigin?: string
	/** Vite adds styles as elements and talks to the page over a web socket. */
	isDevelopment?: boolean
}

/**
 * The Content-Security-Policy of every page. One place decides it; no other header or middleware sets one.
 * The pages carry no style attributes and no inline styles, so that styles need no exception either.
 */
export function contentSecurityPolicy({ nonce, paymentOrigin, isDevelopment = false }: CspOptions): string {
	const directives: [name: string, ...sources: (string | false | undefined)[]][] = [
		// All that is not named below comes from us: no page asks anything of another machine.
		["default-src", "'self'"],
		// Our bundles, and the few inline scripts that start them, by nonce.
		["script-src", "'self'", `'nonce-${nonce}'`],
		["style-src", "'self'", isDevelopment && "'unsafe-inline'"],
		// data: for pictures drawn on the server, such as QR codes.
		["img-src", "'self'", "data:"],
		["font-src", "'self'"],
		["connect-src", "'self'", isDevelopment && "ws:"],
		// Paying is a form that answers with a redirect, and browsers hold the redirect to this list too.
		["form-action", "'self'", "https://checkout.stripe.com", paymentOrigin],
		// Nobody may lay our buttons under theirs.
		["frame-ancestors", "'none'"],
		// A planted base element would send every relative link elsewhere.
		["base-uri", "'none'"],
		["object-src", "'none'"],
	]
	return directives.map((directive) => directive.filter(Boolean).join(" ")).join("; ")
}

/** The origin of an address from the environment, or undefined where there is none or it is not an address. */
export function originOf(address: string | undefined): string | undefined {
	return address && URL.canParse(address) ? new URL(address).origin : undefined
}
