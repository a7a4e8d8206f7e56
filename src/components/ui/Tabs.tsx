import type { ReactNode } from 'react';
import { Tab, TabList, TabPanel, Tabs as AriaTabs } from 'react-aria-components';

export interface TabsProps<T extends string> {
  label: string;
  tabs: readonly { id: T; label: ReactNode; content: ReactNode; disabled?: boolean }[];
  value?: T;
  onChange?: (value: T) => void;
}

/** Parts of one page. Arrow keys move between tabs. For places with their own address use links in `.tabs` instead. */
export function Tabs<T extends string>({ label, tabs, value, onChange }: TabsProps<T>) {
  return (
    <AriaTabs
      selectedKey={value}
      onSelectionChange={(key) => {
        const next = tabs.find((tab) => tab.id === key);
        if (next) onChange?.(next.id);
      }}
    >
      <TabList aria-label={label} className="tabs">
        {tabs.map((tab) => (
          <Tab key={tab.id} id={tab.id} isDisabled={tab.disabled}>
            {tab.label}
          </Tab>
        ))}
      </TabList>
      {tabs.map((tab) => (
        <TabPanel key={tab.id} id={tab.id} className="tabpanel">
          {tab.content}
        </TabPanel>
      ))}
    </AriaTabs>
  );
}
