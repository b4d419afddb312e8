export const signInText = {
  title: 'Sign in',
  pitch: 'Staged pierces and corners for thick plate: designed, approved, found again at the machine.',
  mail: 'Mail address',
  password: 'Password',
  show: 'Show the password',
  action: 'Sign in',
  demo: 'This is a demonstration. Sign in as',
  demoHint: (password: string) => `Every demo account has the password “${password}”. A tap fills the form.`,
  help: 'No account, or the password is lost? The cutting lead of your plant can help.',
} as const;
