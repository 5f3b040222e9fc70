/** What every page says at its foot. */
export function StandingCautions() {
  return (
    <footer className="foot">
      <div>
        <p>
          Research use only; not for clinical decisions. Animal work stays under local ethics approval and
          licence; approval numbers are recorded here and no review is replaced. No data that identifies a
          person. Decoding is not proof that the brain uses the signal; a readout that fails is not proof of
          absence.
        </p>
      </div>
    </footer>
  );
}
