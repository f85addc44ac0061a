import type { ReactNode } from "react";
import { Link, NavLink } from "react-router-dom";
import { Button } from "../../../components/ui/button.tsx";
import { joinClasses } from "../../../components/ui/join-classes.ts";
import { PageHeading } from "../../../components/ui/page-heading.tsx";
import { paths } from "../../../config/paths.ts";
import { guidePages, type GuidePage } from "../guide-pages.ts";

/** A page of the guide: the other pages beside it, the one before and the one after at its foot. */
export function GuideSheet({ page, children }: { page: GuidePage; children: ReactNode }) {
  const index = guidePages.findIndex(({ slug }) => slug === page.slug);
  return (
    <div className="guide">
      <Contents />
      <article className="min-w-0">
        <PageHeading title={page.title} lead={page.lead}>
          <Button onClick={() => window.print()}>Print page</Button>
        </PageHeading>
        <div className="sheet-stack">{children}</div>
        <nav
          aria-label="Pages before and after"
          className="no-print mt-10 flex flex-wrap justify-between gap-4 border-t border-rule pt-3"
        >
          <Step page={guidePages[index - 1]} words="Before" />
          <Step page={guidePages[index + 1]} words="Next" />
        </nav>
      </article>
    </div>
  );
}

function Step({ page, words }: { page: GuidePage | undefined; words: string }) {
  if (!page) return <span />;
  return (
    <span>
      <span className="text-muted">{words}: </span>
      <Link className="link" to={paths.guidePage(page.slug)}>
        {page.title}
      </Link>
    </span>
  );
}

/** All pages of the guide. */
export function Contents() {
  return (
    <nav aria-label="Guide" className="guide-contents no-print">
      <ol>
        <li>
          <ContentsLink to={paths.guide}>Guide</ContentsLink>
        </li>
        {guidePages.map(({ slug, title }) => (
          <li key={slug}>
            <ContentsLink to={paths.guidePage(slug)}>{title}</ContentsLink>
          </li>
        ))}
      </ol>
    </nav>
  );
}

function ContentsLink({ to, children }: { to: string; children: string }) {
  return (
    <NavLink
      to={to}
      end
      className={({ isActive }) =>
        joinClasses(
          "block border-l-2 py-1 pl-3 max-lg:border-l-0 max-lg:border-b-2 max-lg:pl-0",
          isActive ? "border-ink font-semibold" : "border-transparent hover:border-rule",
        )
      }
    >
      {children}
    </NavLink>
  );
}
