/** Before the first answer of the server: the beam alone, since most often it is over within a blink. */
export function Starting() {
  return (
    <main className="px-5 pt-12 sm:px-10">
      <p role="status" className="sr-only">
        Opening Quarterturn
      </p>
    </main>
  );
}
