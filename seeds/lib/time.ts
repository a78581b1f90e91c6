/** Times before now: so many days ago, at a time of the clock (UTC). The demo is always as old as it was yesterday. */
export function clock(now: Date): (daysAgo: number, time: string) => Date {
  return (daysAgo, time) => {
    const day = new Date(now.getTime() - daysAgo * 24 * 3600 * 1000).toISOString().slice(0, 10);
    return new Date(`${day}T${time}:00.000Z`);
  };
}
