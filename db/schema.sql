CREATE TABLE public.computations (
    id bigint NOT NULL,
    paper_id text NOT NULL,
    person_id uuid,
    cells text[] NOT NULL,
    begun_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    seconds double precision DEFAULT '0'::double precision NOT NULL,
    ended_at timestamp with time zone,
    work json,
    begun_times integer DEFAULT 1 NOT NULL
);

CREATE SEQUENCE public.computations_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1;

ALTER SEQUENCE public.computations_id_seq OWNED BY public.computations.id;

CREATE TABLE public.identities (
    provider text NOT NULL,
    subject text NOT NULL,
    person_id uuid NOT NULL,
    login text NOT NULL
);

CREATE TABLE public.members (
    paper_id text NOT NULL,
    person_id uuid NOT NULL,
    role text NOT NULL,
    put_by_at timestamp with time zone,
    added_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    CONSTRAINT members_role CHECK ((role = ANY (ARRAY['owner'::text, 'author'::text, 'referee'::text, 'reader'::text])))
);

CREATE TABLE public.paper_results (
    paper_id text NOT NULL,
    key text NOT NULL,
    person_id uuid,
    at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL
);

CREATE TABLE public.paper_snapshots (
    paper_id text NOT NULL,
    doc text NOT NULL,
    state bytea NOT NULL,
    upto bigint NOT NULL,
    created_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    CONSTRAINT paper_snapshots_doc CHECK ((doc = ANY (ARRAY['text'::text, 'shown'::text])))
);

CREATE TABLE public.paper_updates (
    id bigint NOT NULL,
    paper_id text NOT NULL,
    doc text NOT NULL,
    update bytea NOT NULL,
    person_id uuid,
    created_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    CONSTRAINT paper_updates_doc CHECK ((doc = ANY (ARRAY['text'::text, 'shown'::text])))
);

CREATE SEQUENCE public.paper_updates_id_seq
    START WITH 1
    INCREMENT BY 1
    NO MINVALUE
    NO MAXVALUE
    CACHE 1;

ALTER SEQUENCE public.paper_updates_id_seq OWNED BY public.paper_updates.id;

CREATE TABLE public.papers (
    id text NOT NULL,
    title text DEFAULT ''::text NOT NULL,
    authors text DEFAULT ''::text NOT NULL,
    specimen boolean DEFAULT false NOT NULL,
    created_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    changed_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL
);

CREATE TABLE public.people (
    id uuid DEFAULT gen_random_uuid() NOT NULL,
    name text NOT NULL,
    email text,
    created_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL
);

CREATE TABLE public.result_parts (
    key text NOT NULL,
    index integer NOT NULL,
    part json NOT NULL,
    seconds double precision NOT NULL,
    created_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL
);

CREATE TABLE public.results (
    key text NOT NULL,
    kind text NOT NULL,
    solver text NOT NULL,
    result json NOT NULL,
    seconds double precision NOT NULL,
    created_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL
);

CREATE TABLE public.sessions (
    id_hash text NOT NULL,
    person_id uuid NOT NULL,
    created_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    last_seen_at timestamp with time zone DEFAULT CURRENT_TIMESTAMP NOT NULL,
    expires_at timestamp with time zone NOT NULL
);

ALTER TABLE ONLY public.computations ALTER COLUMN id SET DEFAULT nextval('public.computations_id_seq'::regclass);

ALTER TABLE ONLY public.paper_updates ALTER COLUMN id SET DEFAULT nextval('public.paper_updates_id_seq'::regclass);

ALTER TABLE ONLY public.computations
    ADD CONSTRAINT computations_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.identities
    ADD CONSTRAINT identities_pkey PRIMARY KEY (provider, subject);

ALTER TABLE ONLY public.members
    ADD CONSTRAINT members_pkey PRIMARY KEY (paper_id, person_id);

ALTER TABLE ONLY public.paper_results
    ADD CONSTRAINT paper_results_pkey PRIMARY KEY (paper_id, key);

ALTER TABLE ONLY public.paper_snapshots
    ADD CONSTRAINT paper_snapshots_pkey PRIMARY KEY (paper_id, doc);

ALTER TABLE ONLY public.paper_updates
    ADD CONSTRAINT paper_updates_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.papers
    ADD CONSTRAINT papers_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.people
    ADD CONSTRAINT people_pkey PRIMARY KEY (id);

ALTER TABLE ONLY public.result_parts
    ADD CONSTRAINT result_parts_pkey PRIMARY KEY (key, index);

ALTER TABLE ONLY public.results
    ADD CONSTRAINT results_pkey PRIMARY KEY (key);

ALTER TABLE ONLY public.sessions
    ADD CONSTRAINT sessions_pkey PRIMARY KEY (id_hash);

CREATE INDEX computations_person_id_begun_at_index ON public.computations USING btree (person_id, begun_at);

CREATE INDEX computations_unfinished ON public.computations USING btree (id) WHERE ((ended_at IS NULL) AND (work IS NOT NULL));

CREATE INDEX identities_person_id_index ON public.identities USING btree (person_id);

CREATE INDEX identities_provider_login_index ON public.identities USING btree (provider, login);

CREATE INDEX members_person_id_index ON public.members USING btree (person_id);

CREATE INDEX paper_updates_paper_id_doc_id_index ON public.paper_updates USING btree (paper_id, doc, id);

CREATE INDEX result_parts_created_at_index ON public.result_parts USING btree (created_at);

CREATE INDEX sessions_expires_at_index ON public.sessions USING btree (expires_at);

CREATE INDEX sessions_person_id_index ON public.sessions USING btree (person_id);

ALTER TABLE ONLY public.computations
    ADD CONSTRAINT computations_paper_id_foreign FOREIGN KEY (paper_id) REFERENCES public.papers(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.computations
    ADD CONSTRAINT computations_person_id_foreign FOREIGN KEY (person_id) REFERENCES public.people(id) ON DELETE SET NULL;

ALTER TABLE ONLY public.identities
    ADD CONSTRAINT identities_person_id_foreign FOREIGN KEY (person_id) REFERENCES public.people(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.members
    ADD CONSTRAINT members_paper_id_foreign FOREIGN KEY (paper_id) REFERENCES public.papers(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.members
    ADD CONSTRAINT members_person_id_foreign FOREIGN KEY (person_id) REFERENCES public.people(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.paper_results
    ADD CONSTRAINT paper_results_key_foreign FOREIGN KEY (key) REFERENCES public.results(key) ON DELETE CASCADE;

ALTER TABLE ONLY public.paper_results
    ADD CONSTRAINT paper_results_paper_id_foreign FOREIGN KEY (paper_id) REFERENCES public.papers(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.paper_results
    ADD CONSTRAINT paper_results_person_id_foreign FOREIGN KEY (person_id) REFERENCES public.people(id) ON DELETE SET NULL;

ALTER TABLE ONLY public.paper_snapshots
    ADD CONSTRAINT paper_snapshots_paper_id_foreign FOREIGN KEY (paper_id) REFERENCES public.papers(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.paper_updates
    ADD CONSTRAINT paper_updates_paper_id_foreign FOREIGN KEY (paper_id) REFERENCES public.papers(id) ON DELETE CASCADE;

ALTER TABLE ONLY public.paper_updates
    ADD CONSTRAINT paper_updates_person_id_foreign FOREIGN KEY (person_id) REFERENCES public.people(id) ON DELETE SET NULL;

ALTER TABLE ONLY public.sessions
    ADD CONSTRAINT sessions_person_id_foreign FOREIGN KEY (person_id) REFERENCES public.people(id) ON DELETE CASCADE;
