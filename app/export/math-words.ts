/**
 * Commands that may stand in a formula for print: those that the page sets too and that LaTeX with amsmath, amssymb and
 * mathtools knows. None of them reads a file, defines a command, changes a category or writes anything.
 */
const words = (text: string) => text.trim().split(/\s+/);

const GREEK = words(`
  alpha beta gamma delta epsilon varepsilon zeta eta theta vartheta iota kappa varkappa lambda mu nu xi pi varpi rho
  varrho sigma varsigma tau upsilon phi varphi chi psi omega digamma Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi
  Omega varGamma varDelta varTheta varLambda varXi varPi varSigma varUpsilon varPhi varPsi varOmega`);

const OPERATORS = words(`
  arccos arcsin arctan arg cos cosh cot coth csc deg det dim exp gcd hom inf ker lg lim liminf limsup ln log max min Pr
  sec sin sinh sup tan tanh injlim projlim varliminf varlimsup varinjlim varprojlim operatorname operatorname* bmod pmod
  pod mod sum prod coprod int iint iiint oint bigcap bigcup bigsqcup bigvee bigwedge bigodot bigoplus bigotimes biguplus
  limits nolimits substack`);

const RELATIONS = words(`
  le leq ge geq lt gt ne neq leqslant geqslant leqq geqq ll gg lll ggg prec succ preceq succeq approx approxeq simeq cong
  equiv sim nsim asymp doteq propto varpropto in ni notin owns subset supset subseteq supseteq subsetneq supsetneq
  nsubseteq nsupseteq sqsubseteq sqsupseteq mid nmid parallel nparallel perp vdash dashv models Vdash lesssim gtrsim
  lessapprox gtrapprox lessgtr gtrless nless ngtr nleq ngeq lneq gneq smile frown bowtie coloneqq eqqcolon triangleq
  circeq bumpeq because therefore not`);

const ARROWS = words(`
  to gets leftarrow rightarrow leftrightarrow Leftarrow Rightarrow Leftrightarrow longleftarrow longrightarrow
  longleftrightarrow Longleftarrow Longrightarrow Longleftrightarrow mapsto longmapsto uparrow downarrow updownarrow
  Uparrow Downarrow nearrow searrow swarrow nwarrow hookleftarrow hookrightarrow rightharpoonup rightharpoondown
  leftharpoonup leftharpoondown rightleftharpoons leadsto implies impliedby iff xrightarrow xleftarrow upharpoonright
  restriction twoheadrightarrow rightsquigarrow`);

const BINARY = words(`
  pm mp times div ast star circ bullet cdot cap cup uplus sqcap sqcup vee wedge lor land setminus smallsetminus wr diamond
  bigtriangleup bigtriangledown triangleleft triangleright oplus ominus otimes oslash odot bigcirc dagger ddagger amalg
  ltimes rtimes lhd rhd boxplus boxtimes`);

const SYMBOLS = words(`
  infty partial nabla forall exists nexists neg lnot emptyset varnothing aleph beth hbar hslash ell wp Re Im imath jmath
  prime backprime angle measuredangle triangle square Box Diamond blacksquare bigstar lozenge checkmark flat natural sharp
  surd top bot ldots cdots vdots ddots dots dotsc dotsb dotsm dotsi colon complement eth mho S P copyright pounds
  qed qedhere`);

const DELIMITERS = words(`
  left right middle big Big bigg Bigg bigl Bigl biggl Biggl bigr Bigr biggr Biggr bigm Bigm biggm Biggm langle rangle lvert
  rvert lVert rVert vert Vert lbrace rbrace lbrack rbrack lfloor rfloor lceil rceil lgroup rgroup ulcorner urcorner
  llcorner lrcorner backslash | { }`);

const CONSTRUCTIONS = words(`
  frac dfrac tfrac cfrac binom dbinom tbinom genfrac sqrt overline underline overbrace underbrace overrightarrow
  overleftarrow overleftrightarrow overset underset stackrel sideset prescript hat widehat check tilde widetilde acute grave
  dot ddot dddot breve bar vec mathring boxed cancel bcancel xcancel phantom hphantom vphantom smash mathstrut
  over atop choose rightarrowtail nonumber notag tag tag* hline`);

const FONTS = words(`
  mathrm mathbf mathit mathsf mathtt mathcal mathbb mathfrak mathscr mathnormal boldsymbol bm pmb bf it rm sf tt
  displaystyle textstyle scriptstyle scriptscriptstyle mathord mathbin mathrel mathop mathopen mathclose mathpunct mathinner`);

const SPACES = [
  ...words(", : ; ! > quad qquad enspace thinspace medspace thickspace negthinspace negmedspace negthickspace"),
  " ",
  "\n",
  "\\",
];

const ESCAPED = words("% # & _ $");

export const COMMANDS: ReadonlySet<string> = new Set([
  ...GREEK,
  ...OPERATORS,
  ...RELATIONS,
  ...ARROWS,
  ...BINARY,
  ...SYMBOLS,
  ...DELIMITERS,
  ...CONSTRUCTIONS,
  ...FONTS,
  ...SPACES,
  ...ESCAPED,
]);

/** Words within a formula. */
export const TEXT_COMMANDS: ReadonlySet<string> = new Set([
  "text",
  "textrm",
  "textbf",
  "textit",
  "textsf",
  "texttt",
  "textnormal",
  "mbox",
]);

export const ENVIRONMENTS: ReadonlySet<string> = new Set([
  "matrix",
  "pmatrix",
  "bmatrix",
  "Bmatrix",
  "vmatrix",
  "Vmatrix",
  "smallmatrix",
  "cases",
  "dcases",
  "rcases",
  "aligned",
  "gathered",
  "split",
  "subarray",
  "array",
  "alignedat",
]);

/** Displays of their own, and what each is inside one. */
export const ALIGNMENTS: ReadonlyMap<string, string> = new Map([
  ["align", "aligned"],
  ["align*", "aligned"],
  ["gather", "gathered"],
  ["gather*", "gathered"],
  ["equation", ""],
  ["equation*", ""],
]);
