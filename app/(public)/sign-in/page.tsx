import type { Metadata } from 'next';
import { Mark } from '@/components/shell/mark';
import { ThemeToggle } from '@/components/shell/theme-toggle';
import { OutOfFoldDrawing } from '@/components/sign-in/out-of-fold-drawing';
import { SignInForm } from '@/components/sign-in/sign-in-form';
import { Num } from '@/components/ui/num';
import packageFacts from '@/package.json';

export const metadata: Metadata = { title: 'Sign in' };

export default async function SignInPage({
  searchParams,
}: {
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}) {
  const { next } = await searchParams;
  return (
    <>
      <main id="sheet" tabIndex={-1} className="sign-in-sheet">
        <section className="sec">
          <div className="margin">
            <p className="mark mark-large">
              <Mark size={30} />
              Outfold
            </p>
          </div>
          <div className="body">
            <h1 className="vh">Outfold, sign in</h1>
            <p className="verdict">
              Linear readouts of a trial’s label from a population’s spikes. Every number shown comes from
              trials that were <b>out of the fold</b> it was fitted on.
            </p>
            <figure>
              <OutOfFoldDrawing className="wide" width={1104} height={220} />
              <OutOfFoldDrawing className="narrow" width={346} height={190} />
            </figure>
          </div>
        </section>
        <section className="sec">
          <div className="margin">
            <h2>Sign in</h2>
            <p>Accounts are made by invitation from a lab.</p>
          </div>
          <div className="body">
            <div className="figs sign-in-columns">
              <SignInForm next={typeof next === 'string' ? next : null} />
              <div>
                <h3>Standing cautions</h3>
                <ul className="cautions">
                  <li>
                    <b>Research use only.</b> Not for clinical decisions.
                  </li>
                  <li>
                    <b>Animal work stays under local ethics approval and licence.</b> Outfold records approval
                    numbers and replaces no review.
                  </li>
                  <li>
                    <b>No data that identifies a person.</b> Animals are known by a code of the lab.
                  </li>
                  <li>
                    <b>Decoding is not proof that the brain uses the signal.</b> A readout that fails is not
                    proof of absence.
                  </li>
                </ul>
              </div>
            </div>
          </div>
        </section>
      </main>
      <footer className="foot">
        <div>
          <p className="quiet">
            Outfold <Num>{packageFacts.version}</Num> · <ThemeToggle className="linklike" />
          </p>
        </div>
      </footer>
    </>
  );
}
