import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '../../components/button';
import { Dialog } from '../../components/dialog';
import { PlusIcon } from '../../components/icons';
import { Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { type Property, propertiesQuery } from '../../lib/clients';
import { placeText } from '../../lib/place';
import { useAddProperty, useEditProperty } from './api';
import styles from './clients.module.css';
import { emptyProperty, PropertyForm } from './property-form';

interface PropertiesSectionProps {
  readonly clientId: string;
  readonly editable: boolean;
}

export function PropertiesSection({ clientId, editable }: PropertiesSectionProps) {
  const properties = useQuery(propertiesQuery(clientId));
  const add = useAddProperty(clientId);
  const [adding, setAdding] = useState(false);
  const [editing, setEditing] = useState<Property | null>(null);
  return (
    <Section
      title="Properties"
      actions={
        editable && (
          <Button onClick={() => setAdding(true)}>
            <PlusIcon />
            Add a property
          </Button>
        )
      }
      lede={properties.data?.length === 0 ? 'None yet. A job is always at a property.' : undefined}
    >
      {properties.isPending && <SkeletonRows rows={2} label="Loading properties" />}
      {properties.isError && <Problem error={properties.error} onRetry={() => properties.refetch()} />}
      <ul>
        {properties.data?.map((property) => (
          <li key={property.id} className={styles.property}>
            <div>
              <strong>{property.name}</strong>
              {property.address !== '' && property.address !== property.name && <div>{property.address}</div>}
              {property.region !== '' && <div className="quiet">{property.region}</div>}
              {property.latitude !== null && property.longitude !== null && (
                <div className="quiet">
                  {placeText({ latitude: property.latitude, longitude: property.longitude })}
                </div>
              )}
              {property.accessNotes !== '' && <div className={styles.notes}>{property.accessNotes}</div>}
            </div>
            {editable && (
              <Button kind="bare" onClick={() => setEditing(property)} aria-label={`Edit ${property.name}`}>
                Edit
              </Button>
            )}
          </li>
        ))}
      </ul>
      <Dialog open={adding} onOpenChange={setAdding} title="Add a property">
        <PropertyForm
          start={emptyProperty}
          label="Add a property"
          submitLabel="Add the property"
          onSubmit={async (fields) => {
            await add.mutateAsync(fields);
            setAdding(false);
          }}
        />
      </Dialog>
      {editing && <EditProperty property={editing} onClose={() => setEditing(null)} />}
    </Section>
  );
}

function EditProperty({ property, onClose }: { property: Property; onClose: () => void }) {
  const edit = useEditProperty(property.id);
  const { name, address, region, accessNotes, latitude, longitude } = property;
  return (
    <Dialog open onOpenChange={(open) => !open && onClose()} title={`Edit ${property.name}`}>
      <PropertyForm
        start={{ name, address, region, accessNotes, latitude, longitude }}
        label="Edit the property"
        submitLabel="Save"
        onSubmit={async (fields) => {
          await edit.mutateAsync(fields);
          onClose();
        }}
      />
    </Dialog>
  );
}
