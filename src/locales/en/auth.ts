export default {
  signIn: {
    title: 'Sign in',
    email: 'E-mail address',
    password: 'Password',
    act: 'Sign in',
    forgotten: 'Password forgotten?',
    noAccount: 'People are invited by an administrator; there is no other way to an account.',
    emailMissing: 'Your e-mail address is needed.',
    passwordMissing: 'Your password is needed.',
    set: 'Your password is set. Sign in with it.',
  },
  forgotten: {
    title: 'Password forgotten',
    text: 'Write the address of your account. A link to choose a new password goes there by mail.',
    act: 'Send the link',
    sent: 'The request is on its way',
    sentText:
      'If {email} belongs to somebody here, a mail with a link arrives within minutes. The link works once, within one hour; your present password stays until then.',
    again: 'Another address',
    back: 'Back to sign in',
    invalid: "Write an e-mail address, such as name{'@'}example.com.",
  },
  link: {
    titles: {
      invitation: 'Welcome, {name}',
      reset: 'Choose a new password',
      first_administrator: 'The first administrator',
    },
    texts: {
      invitation: 'Choose a password for {email}. You sign in with both from then on.',
      reset:
        'For {email}. The new password ends all your open sessions, so that nobody else stays signed in.',
      first_administrator:
        'Nobody can sign in yet. You will invite the others; an administrator looks after people and records, and signs nothing.',
    },
    until: 'This link works once, until {time}.',
    name: 'Your name',
    nameHint: 'As it is to stand beside what you do.',
    nameMissing: 'Your name is needed; it stands beside what you do.',
    email: 'E-mail address',
    password: 'New password',
    passwordHint: '15 characters or more. A sentence of your own works well; spaces count.',
    passwordShort: 'Use at least 15 characters; {count} so far.',
    act: 'Set the password',
    dead: 'This link does not work',
    deadHelp: 'Ask for a new one here, or ask your administrator for another invitation.',
    ask: 'Ask for a new link',
  },
};
