import { Text, Theme } from '@radix-ui/themes';
import { createRoot } from 'react-dom/client';
import '../../../client/src/styles/index.css';

createRoot(document.getElementById('root')).render(
  <Theme accentColor="jade" grayColor="sand" radius="small">
    <Text as="p">Nothing but the theme and a line of words.</Text>
  </Theme>,
);
