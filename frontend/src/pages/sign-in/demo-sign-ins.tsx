import type { SignInInput } from '@stayledger/shared/contracts/auth';
import type { Role } from '@stayledger/shared/permissions/permissions';
import { useQuery } from '@tanstack/react-query';
import { PlainButton } from '../../components/plain-button/plain-button';
import { sessionQueries } from '../../lib/session.queries';
import styles from './sign-in.module.css';

const COMES_FOR: Record<Role, string> = {
  surveyor: 'estimates wire life from a season of loads',
  rigger: 'keeps the rigs of a fleet',
  owner: 'sees what is due on one vessel, and why',
  insurer: 'reads reports before renewal',
  administrator: 'runs the service',
};

/** Offered only by a service that runs the demo; nothing stands here otherwise. */
export function DemoSignIns({
  pending,
  onChoose,
}: {
  pending: boolean;
  onChoose: (chosen: SignInInput) => void;
}) {
  const demo = useQuery(sessionQueries.demoSignIns());
  if (!demo.data || demo.data.items.length === 0) return null;
  return (
    <div className={styles.demo}>
      <h2>Look around as</h2>
      <p className="soft">The demo shows an invented coast with invented vessels and people.</p>
      <ul>
        {demo.data.items.map((item) => (
          <li key={item.email}>
            <PlainButton
              disabled={pending}
              onClick={() => onChoose({ email: item.email, password: item.password })}
            >
              {item.role}
            </PlainButton>
            <span>
              {item.name}, {COMES_FOR[item.role]}
            </span>
          </li>
        ))}
      </ul>
    </div>
  );
}
