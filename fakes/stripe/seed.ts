import type Stripe from "stripe"

function reader(id: string, label: string, serial: string): Stripe.Terminal.Reader {
	return {
		id,
		object: "terminal.reader",
		action: null,
		device_sw_version: "fake-1",
		device_type: "simulated_wisepos_e",
		ip_address: "127.0.0.1",
		label,
		last_seen_at: null,
		livemode: false,
		location: "tml_demo",
		metadata: {},
		serial_number: serial,
		status: "online",
	}
}

/** Puts the two readers of the demo into `readers`; their ids are fixed, so a producer's settings can name them. */
export function seedReaders(readers: Map<string, Stripe.Terminal.Reader>): void {
	for (const made of [
		reader("tmr_demo_stall", "Stall reader", "DEMO-0001"),
		reader("tmr_demo_stall_2", "Second stall reader", "DEMO-0002"),
	]) {
		readers.set(made.id, made)
	}
}
