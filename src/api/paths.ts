/** Every address in the app. */
export const paths = {
  home: () => '/',
  signIn: (returnTo?: string) =>
    returnTo && returnTo !== '/' ? `/sign-in?to=${encodeURIComponent(returnTo)}` : '/sign-in',
  forgotten: () => '/forgotten-password',
  studies: () => '/studies',
  study: (studyId: string) => `/studies/${studyId}`,
  outline: (studyId: string) => `/studies/${studyId}?view=outline`,
  newTest: (studyId: string) => `/studies/${studyId}/tests/new`,
  test: (studyId: string, testId: string) => `/studies/${studyId}/tests/${testId}`,
  decisionLog: (studyId: string) => `/studies/${studyId}/log`,
  members: (studyId: string) => `/studies/${studyId}/members`,
  submission: (submissionId: string) => `/submissions/${submissionId}`,
  people: () => '/people',
} as const;
