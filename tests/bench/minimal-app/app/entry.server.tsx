/** The product's own way of answering with a page, so that the two differ in what stands on the page alone. */
export { default } from "~/entry.server"
