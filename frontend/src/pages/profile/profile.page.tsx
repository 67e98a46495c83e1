import { useState } from 'react';
import { PageHeading } from '../../components/page-heading/page-heading';
import { PasswordForm } from '../../features/profile/password-form';
import { ProfileForm } from '../../features/profile/profile-form';
import { useSession } from '../../lib/session';

export function ProfilePage() {
  const { user, roles } = useSession();
  const [saved, setSaved] = useState(false);
  const capacities = roles
    .map(({ role, firmName }) => (firmName ? `${role} at ${firmName}` : role))
    .join(', ');
  return (
    <>
      <PageHeading title="Your profile" below={`${user.email}${capacities ? `, ${capacities}` : ''}`} />
      {/* A new version is a new form: what it showed before was another state. */}
      <ProfileForm key={user.version} saved={saved} onSaved={setSaved} />
      <h2 style={{ marginTop: 40 }}>Password</h2>
      <PasswordForm />
    </>
  );
}
