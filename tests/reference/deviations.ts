/** The worst deviation met by each published check, printed as a table when a file of checks is through. */
export class Deviations {
  private readonly worst = new Map<string, number>();

  /** Notes a deviation and returns it, for the assertion. */
  note(source: string, deviation: number): number {
    this.worst.set(source, Math.max(this.worst.get(source) ?? 0, deviation));
    return deviation;
  }

  print(title: string): void {
    const rows = [...this.worst].map(
      ([source, deviation]) => `  ${deviation.toExponential(1).padStart(8)}  ${source}`,
    );
    process.stdout.write(`${title}\n${rows.join('\n')}\n`);
  }
}
