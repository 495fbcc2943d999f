/** Invented people of the demo. No such institutes; addresses end in `.example`. */
export interface DemoPerson {
  /** Number of the account at the stand-in. */
  readonly subject: string;
  readonly login: string;
  readonly name: string;
  readonly email: string;
  /** What they are on the specimen paper; null: a stranger to it. */
  readonly role: "owner" | "author" | "referee" | "reader" | null;
  /** A line about them on the stand-in's page. */
  readonly about: string;
}

export const DEMO_PEOPLE: readonly DemoPerson[] = [
  {
    subject: "9001",
    login: "ines-valadao",
    name: "Inês Valadão",
    email: "ines.valadao@litoral.example",
    role: "owner",
    about: "Author and owner of the specimen paper",
  },
  {
    subject: "9002",
    login: "tormod-hagelund",
    name: "Tormod Hagelund",
    email: "t.hagelund@kystmat.example",
    role: "author",
    about: "Author of the specimen paper",
  },
  {
    subject: "9003",
    login: "wanjiru-kamande",
    name: "Wanjiru Kamande",
    email: "w.kamande@mwamba.example",
    role: "referee",
    about: "Referee of the specimen paper",
  },
  {
    subject: "9004",
    login: "ruo-lan-sim",
    name: "Ruo-Lan Sim",
    email: "ruo-lan.sim@selat.example",
    role: "reader",
    about: "Reader of the specimen paper",
  },
  {
    subject: "9005",
    login: "dipankar-lahiri",
    name: "Dipankar Lahiri",
    email: "d.lahiri@doab.example",
    role: null,
    about: "A stranger, on no paper of the others",
  },
];
