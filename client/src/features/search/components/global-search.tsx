import { useQuery } from '@tanstack/react-query';
import { useDeferredValue, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { SearchBox } from '../../../components/ui/search-box.tsx';
import { searchList } from '../api.ts';
import { hrefOf, resultOf } from '../model.ts';

/** The rail's search over probes and measuring points; "/" brings the focus from anywhere. */
export function GlobalSearch({ hotkey }: { hotkey?: string }) {
  const [text, setText] = useState('');
  const query = useQuery(searchList(useDeferredValue(text.trim())));
  const navigate = useNavigate();
  const hits = text.trim() === '' ? [] : (query.data?.items ?? []);
  return (
    <SearchBox
      label="Search probes and measuring points"
      text={text}
      onTextChange={setText}
      results={hits.map(resultOf)}
      isSearching={query.isFetching}
      emptySentence={
        query.isError
          ? 'The search did not answer. Try again in a moment.'
          : 'Nothing found. Try a part of the tag, serial number or point name.'
      }
      onChoose={(result) => {
        const hit = hits.find((one) => resultOf(one).key === result.key);
        if (hit) void navigate(hrefOf(hit));
      }}
      {...(hotkey ? { hotkey } : {})}
    />
  );
}
