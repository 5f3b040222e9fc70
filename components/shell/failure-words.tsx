/** What a page says when it could not be made. `digest` "unavailable" means that a part of the service is away; any other is the log's number. */
export function FailureWords({ digest }: { digest: string | undefined }) {
  if (digest === 'unavailable')
    return (
      <>
        <p>
          The database, the queue or the file store does not answer at the moment. What is stored is safe,
          uploads can go on where they stopped, and readouts that are under way go on or start again by
          themselves.
        </p>
        <p>
          {/* eslint-disable-next-line @next/next/no-html-link-for-pages -- it answers JSON and is no page of the application */}
          <a href="/api/health">See which parts answer</a>
        </p>
      </>
    );
  return (
    <>
      <p>Something went wrong on our side. What is stored is safe, and work that is under way goes on.</p>
      {digest ? (
        <p>
          If it stays, give the person who runs this installation the number <code>{digest}</code>; it stands
          in the log.
        </p>
      ) : null}
    </>
  );
}
