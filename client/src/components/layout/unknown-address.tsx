import { ButtonLink } from '../ui/button.tsx';
import { PageHead } from '../ui/page-head.tsx';

/** The page for an address that leads nowhere. */
export function UnknownAddress({ home }: { home: string }) {
  return (
    <>
      <PageHead
        name="No such page"
        sentence={
          <>
            Nothing is kept at this address. It may have been mistyped, or you may not see it with your
            rights. <b>Search by name or tag, or start again.</b>
          </>
        }
      />
      <ButtonLink kind="primary" to={home}>
        To the start
      </ButtonLink>
    </>
  );
}
