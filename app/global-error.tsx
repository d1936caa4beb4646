'use client';

/** For a fault of the outermost frame itself: nothing of ours is there to draw with. */
export default function GlobalError({ error }: { error: Error & { digest?: string } }) {
  return (
    <html lang="en-GB">
      <body>
        <main>
          <h1>This page could not be made</h1>
          <p>
            Nothing was changed. The server&apos;s log has the reason
            {error.digest ? ` under ${error.digest}` : ''}.
          </p>
          <p>
            <a href="/">To the beginning</a>
          </p>
        </main>
      </body>
    </html>
  );
}
