import { Link } from 'react-router-dom';
import { Cautions } from '../../components/cautions/cautions';
import { GLOSSARY } from '../../components/glossary/glossary';
import { PageHeading } from '../../components/page-heading/page-heading';
import { GUIDES, type Guide } from '../../features/help/guides';
import styles from '../../features/help/help.module.css';
import { useSession } from '../../lib/session';

/** The guides, those of the reader's own roles first and open, then the words. */
export function HelpPage() {
  const session = useSession();
  const own = GUIDES.filter(({ role }) => session.hasRole(role));
  const others = GUIDES.filter(({ role }) => !session.hasRole(role));
  return (
    <>
      <PageHeading
        title="Help"
        below="A short guide for what you came for. Words with a dotted line explain themselves where they stand; all of them are listed below."
      />
      {own.map((guide) => (
        <section key={guide.role} aria-labelledby={`guide-${guide.role}`} className={styles.guide}>
          <h2 id={`guide-${guide.role}`}>{guide.title}</h2>
          <Steps guide={guide} linked />
        </section>
      ))}
      <Cautions />
      <section aria-labelledby="words" className={styles.guide}>
        <h2 id="words">Words</h2>
        <dl className={styles.words}>
          {Object.entries(GLOSSARY)
            .sort(([a], [b]) => a.localeCompare(b))
            .map(([word, meaning]) => (
              <div key={word}>
                <dt>{word}</dt>
                <dd>{meaning}</dd>
              </div>
            ))}
        </dl>
      </section>
      <section aria-labelledby="others" className={styles.guide}>
        <h2 id="others">What others see</h2>
        {others.map((guide) => (
          <details key={guide.role} className={styles.other}>
            <summary>{guide.title}</summary>
            <Steps guide={guide} linked={false} />
          </details>
        ))}
      </section>
    </>
  );
}

/** Links stand only where the reader may follow them. */
function Steps({ guide, linked }: { guide: Guide; linked: boolean }) {
  return (
    <>
      <p className={styles.for}>{guide.comesFor}</p>
      <ol className={styles.steps}>
        {guide.steps.map(({ title, text, link }) => (
          <li key={title}>
            <p className={styles.title}>{title}</p>
            <p>{text}</p>
            {link && linked ? (
              <p>
                <Link to={link.to}>{link.label}</Link>
              </p>
            ) : null}
          </li>
        ))}
      </ol>
    </>
  );
}
