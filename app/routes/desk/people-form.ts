import { z } from "zod"
import { isStoreRole, producerRoles, type Role, storeRoles } from "~/domain/people/roles"
import { emailField } from "../auth/sign-in-fields"

const ROLES = [...producerRoles, ...storeRoles] as const

/** An invitation as typed on the people page: a store is for buyers and payers, and they need one. */
export const invitationForm = z
	.object({
		email: emailField,
		name: z.string().trim().min(1, "Write the person's name.").max(120, "Shorten the name to 120 characters."),
		role: z.enum(ROLES, "Choose what the person is to do."),
		storeId: z.union([z.literal("").transform(() => null), z.guid()], "Choose a store of the list."),
	})
	.transform(({ email, name, role, storeId }, context) => {
		if (!isStoreRole(role)) return { email, name, role, storeId: null }
		if (storeId !== null) return { email, name, role, storeId }
		context.addIssue({ code: "custom", path: ["storeId"], message: "Choose the store the person buys for." })
		return z.NEVER
	})

/** The roles in the order of the list. */
export const rolesToGive: readonly Role[] = ROLES
