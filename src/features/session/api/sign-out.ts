import { currentCsrfToken } from '#src/lib/call-api.ts';

/**
 * Leaves by a real form: the server answers with a redirect to the identity provider, where the
 * session ends too, and only a navigation can follow it there.
 */
export function signOut(): Promise<void> {
  const form = document.createElement('form');
  form.method = 'post';
  form.action = '/auth/sign-out';
  const field = document.createElement('input');
  field.type = 'hidden';
  field.name = 'csrf';
  field.value = currentCsrfToken();
  form.append(field);
  document.body.append(form);
  form.submit();
  return Promise.resolve();
}
