declare global {
  namespace Express {
    /** What passport keeps of a person: only who it is; roles are read afresh on every request. */
    interface User {
      readonly personId: string;
    }
  }
}

export {};
