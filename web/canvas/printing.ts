export function printSheet(): void {
  window.print()
}
