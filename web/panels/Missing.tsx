/** In place of the sheet, in a browser that cannot show it. */
export function Missing({ features }: { readonly features: readonly string[] }) {
  return (
    <main class="sheet missing">
      <h1>Fettle cannot be shown in this browser</h1>
      <p>It lacks:</p>
      <ul>
        {features.map((words) => (
          <li key={words}>{words}</li>
        ))}
      </ul>
      <p>
        A present-day Chromium or Chrome has all of it, and is what Fettle is tested in. Firefox and Safari have it as far as their makers
        say, and are untested here.
      </p>
    </main>
  );
}
