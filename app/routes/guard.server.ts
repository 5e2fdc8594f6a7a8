import { redirect } from "react-router"
import type { ProducerRole, StoreRole } from "~/domain/people/roles"
import { now } from "~/platform/clock.server"
import { isSameOrigin } from "~/platform/origin-check.server"
import { hashToken, readSessionToken } from "~/platform/session-cookie.server"
import { type Actor, findActor, type Person, type Producer, type Store } from "~/services/people/find-actor.server"
import { keepPost } from "~/services/people/keep-post.server"
import { SEEN_MINUTES, touchSession } from "~/services/people/touch-session.server"

/**
 * Whom a loader or action admits. `admits` says it in words for the test that walks every route; `scope` narrows who
 * asks to what the handler may use, or answers why not.
 */
export type Policy<Scope> = {
	readonly admits: string
	readonly scope: (actor: Actor) => Scope | Refusal
	/** Posts of our own pages only; false where the sender proves itself by other means. */
	readonly isForOurPages: boolean
}

type Refusal = "sign-in" | "forbidden" | "not-found"

const STAFF: readonly ProducerRole[] = ["owner", "desk", "packer", "stall"]

/** The policies. Every loader and action of the product declares one of them. */
export const admits = {
	/** Anyone, signed in or not; the address names no producer. */
	anyone: policy("anyone", ({ person }) => ({ person })),

	/** A machine that signs what it sends: the handler checks the signature. */
	signer: { ...policy("signer", () => ({})), isForOurPages: false },

	/** Anyone, on a page of the producer that the address names. */
	visitor: policy("visitor", ({ person, producer }) => (producer ? { person, producer } : "not-found")),

	/** Whoever is signed in. */
	signedIn: policy("signed-in", ({ person }) => (person ? { person } : "sign-in")),

	/** Whoever buys for at least one store of the producer. */
	anyBuyer: policy("any-buyer", ({ person, producer, isBuyer }) => {
		if (!person) return "sign-in"
		return producer && isBuyer ? { person, producer } : "not-found"
	}),

	/** People of the producer with one of these roles. */
	desk: (...roles: ProducerRole[]) =>
		policy(`desk: ${roles.join(", ")}`, ({ person, producer, roles: held }) => {
			if (!person) return "sign-in"
			if (!producer || held.length === 0) return "not-found"
			return held.some((role) => roles.includes(role)) ? { person, producer, roles: held } : "forbidden"
		}),

	/** People of the named store with one of these roles. Another store of the same producer is as good as none. */
	store: (...roles: StoreRole[]) =>
		policy(`store: ${roles.join(", ")}`, ({ person, producer, store, storeRoles }) => {
			if (!person) return "sign-in"
			if (!producer || !store || storeRoles.length === 0) return "not-found"
			return storeRoles.some((role) => roles.includes(role)) ? { person, producer, store, storeRoles } : "forbidden"
		}),

	/** Whoever works at the producer's stall. Which market days they see, the service decides by their name. */
	stall: policy("stall", ({ person, producer, roles }) => {
		if (!person) return "sign-in"
		if (!producer || !roles.some((role) => STAFF.includes(role))) return "not-found"
		const seesEveryDay = roles.includes("owner") || roles.includes("desk")
		return seesEveryDay || roles.includes("stall") ? { person, producer, seesEveryDay } : "forbidden"
	}),
} as const

export type DeskScope = { person: Person; producer: Producer; roles: ProducerRole[] }
export type StoreScope = { person: Person; producer: Producer; store: Store; storeRoles: StoreRole[] }

/** The loader of the root, which shows nothing of anyone: it looks nobody up. */
export const nothingGuarded = Object.assign(() => null, { admits: "anyone" })

type HandlerArgs = { request: Request; params: Record<string, string | undefined> }

/**
 * Wraps a loader or action so that it runs only for whom `policy` admits, and carries the policy's words as `admits`.
 * A visitor is sent to sign in (and back); what they posted is kept until then. A stranger to the producer or store
 * gets 404, which tells nothing; a member without the role gets 403. A post that another site's page made is refused
 * before anything is looked at.
 */
export function guard<Scope, Args extends HandlerArgs, Answer>(
	policy: Policy<Scope>,
	handler: (args: Args, scope: Scope) => Answer | Promise<Answer>,
): ((args: Args) => Promise<Answer>) & { readonly admits: string } {
	const guarded = async (args: Args): Promise<Answer> => {
		const isPost = args.request.method !== "GET" && args.request.method !== "HEAD"
		if (isPost && policy.isForOurPages && !isSameOrigin(args.request)) throw new Response(null, { status: 403 })
		const token = readSessionToken(args.request)
		const actor = await findActor({
			tokenHash: token === null ? null : hashToken(token),
			producerSlug: args.params.producer ?? null,
			storeSlug: args.params.store ?? null,
		})
		const scope = policy.scope(actor)
		if (!isRefusal(scope)) {
			await noteUse(actor.person)
			return handler(args, scope)
		}
		if (scope === "sign-in") throw await toSignIn(args.request)
		throw scope === "forbidden" ? new Response(null, { status: 403 }) : new Response(null, { status: 404 })
	}
	return Object.assign(guarded, { admits: policy.admits })
}

async function noteUse(person: Person | null): Promise<void> {
	if (person && now().getTime() - person.lastSeenAt.getTime() > SEEN_MINUTES * 60_000)
		await touchSession(person.sessionId)
}

async function toSignIn(request: Request): Promise<Response> {
	if (request.method !== "GET" && request.method !== "HEAD") return keepPost(request)
	const { pathname, search } = pageAddress(request.url)
	return redirect(`/sign-in?${new URLSearchParams({ to: pathname + search })}`)
}

/** The address a person sees: without the `.data` and `_routes` that a client navigation adds to it. */
function pageAddress(url: string): URL {
	const address = new URL(url)
	address.pathname = address.pathname.replace(/\/_\.data$|_root\.data$/, "/").replace(/\.data$/, "")
	address.searchParams.delete("_routes")
	address.searchParams.delete("index")
	return address
}

function policy<Scope extends object>(words: string, scope: (actor: Actor) => Scope | Refusal): Policy<Scope> {
	return { admits: words, scope, isForOurPages: true }
}

function isRefusal(scope: unknown): scope is Refusal {
	return typeof scope === "string"
}
