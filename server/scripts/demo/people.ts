/** The invented firm's people. All use one password; it stands in README.md. */
export const demoPassword = 'a chain of known links';

export const demoPeople = {
  administrator: { name: 'Ines Marlow', email: 'ines.marlow@example.test', isAdministrator: true, isAuditor: false },
  engineer: { name: 'Rhea Castell', email: 'rhea.castell@example.test', isAdministrator: false, isAuditor: false },
  secondEngineer: { name: 'Tomas Vik', email: 'tomas.vik@example.test', isAdministrator: false, isAuditor: false },
  manager: { name: 'Adaeze Brandt', email: 'adaeze.brandt@example.test', isAdministrator: false, isAuditor: false },
  secondManager: { name: 'Joris Hallam', email: 'joris.hallam@example.test', isAdministrator: false, isAuditor: false },
  auditor: { name: 'Mina Sorel', email: 'mina.sorel@example.test', isAdministrator: false, isAuditor: true },
} as const;

export type DemoRole = keyof typeof demoPeople;
