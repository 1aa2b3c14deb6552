/** What the sign-up form holds before anything is typed. */
export const blankSignUp = {
  email: '',
  password: '',
  displayName: '',
  region: '',
  timeZone: 'UTC',
  isOfAge: false,
};

export type SignUpValues = typeof blankSignUp;
