import type { DemoPersonView, MeView } from '@kerfyard/common/people';
import { Button, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useErrorWords } from '../../../lib/error-words.ts';
import { demoPeopleQuery, useDemoSignIn } from '../api/demo.queries.ts';
import styles from './first-look.module.css';

/** One press into the demo, as either side; the other people of the demo behind a second one. */
export function DemoDoors({ onSignedIn }: { onSignedIn: (me: MeView) => void }) {
  const { t } = useTranslation('first-look');
  const words = useErrorWords();
  const people = useQuery(demoPeopleQuery).data ?? [];
  const signIn = useDemoSignIn(onSignedIn);
  if (people.length === 0) return null;
  const gc = people.find((person) => person.kind === 'general_contractor');
  const crew = people.find((person) => person.kind === 'cutting_contractor');
  const others = people.filter((person) => person !== gc && person !== crew);
  const enter = (person: DemoPersonView) => signIn.mutate(person.key);
  const busy = (person: DemoPersonView) => signIn.isPending && signIn.variables === person.key;
  return (
    <section className={styles.demo} aria-labelledby="demo">
      <Text as="p" size="2" weight="medium" id="demo">
        {t('demo.title')}
      </Text>
      <div className={styles.doors}>
        {[gc, crew].map(
          (person) =>
            person !== undefined && (
              <Button
                key={person.key}
                size="3"
                variant="outline"
                color="gray"
                highContrast
                loading={busy(person)}
                onClick={() => enter(person)}
              >
                {t(`demo.as.${person.kind}`)}
              </Button>
            ),
        )}
      </div>
      <div role="alert">
        {signIn.isError && (
          <Text as="p" size="2" color="red">
            {words(signIn.error).what}
          </Text>
        )}
      </div>
      {others.length > 0 && (
        <details className={styles.others}>
          <summary>{t('demo.others')}</summary>
          <ul>
            {others.map((person) => (
              <li key={person.key}>
                <Button variant="ghost" color="gray" loading={busy(person)} onClick={() => enter(person)}>
                  <strong>{person.name}</strong>
                  <span>
                    {person.company === null
                      ? t('demo.staff')
                      : t('demo.of', { role: t(`shell:roles.${person.role}`), company: person.company })}
                  </span>
                </Button>
              </li>
            ))}
          </ul>
        </details>
      )}
    </section>
  );
}
