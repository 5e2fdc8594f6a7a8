import { createContext } from "react"

/** The nonce of this answer's scripts. Set on the server only: browsers hide nonces from scripts. */
export const NonceContext = createContext<string | undefined>(undefined)
