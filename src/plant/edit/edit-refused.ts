/**
 * An edit that cannot be made. The message is a sentence for the user. Where there is a function that
 * tells beforehand (`canConnect`, `whyNotGiven`), ask it first.
 */
export class EditRefused extends Error {}
