import { Document, Page, renderToBuffer, StyleSheet, Text, View } from '@react-pdf/renderer'
import { CHECK_TITLES, figureWords, OUTCOME_TITLES } from '@/shared/commissioning-words'
import type { Commissioning, CommissioningCheck } from '@/shared/schemas'
import type { VacuumUnit } from '@/shared/units'

const styles = StyleSheet.create({
  page: { padding: 42, fontFamily: 'Helvetica', fontSize: 10, color: '#0f222c', lineHeight: 1.4 },
  title: { fontFamily: 'Helvetica-Bold', fontSize: 20, lineHeight: 1.2 },
  datum: { fontFamily: 'Helvetica-Oblique', fontSize: 9, color: '#465a66', marginBottom: 10 },
  finding: { fontSize: 13, marginBottom: 10 },
  line: { flexDirection: 'row', borderBottomWidth: 0.5, borderBottomColor: '#cfdae0', paddingVertical: 3 },
  name: { width: '34%', color: '#465a66' },
  value: { width: '66%' },
  check: { marginTop: 14 },
  heading: { fontFamily: 'Helvetica-Bold', fontSize: 11.5 },
  note: { fontSize: 9, color: '#465a66' },
  foot: { position: 'absolute', bottom: 24, left: 42, right: 42, fontSize: 8, color: '#465a66' },
})

/** The built-in face knows the Latin-1 letters alone; the true minus sign is not among them. */
const latin = (text: string): string => text.replaceAll('−', '-')

/**
 * The commissioning record as a PDF: who and when, every attempt with its figures, and what came of it.
 * @param localTime says an instant in the boat's wall-clock time
 */
export function recordPdf(
  record: Commissioning,
  unit: VacuumUnit,
  localTime: (instant: string) => string,
): Promise<Buffer> {
  const at = (instant: string | null) => (instant === null ? '' : localTime(instant))
  const boat = [record.system?.vesselName, record.system?.name].filter(Boolean).join(', ')
  const done = record.checks.filter((check) => check.doneAt !== null)
  return renderToBuffer(
    <Document title={`Commissioning record, ${record.serial}`} author="Middlewatch" language="en">
      <Page size="A4" style={styles.page}>
        <Text style={styles.title}>Commissioning record</Text>
        <Text style={styles.datum}>
          {latin(`Vacuum in ${unit} below ambient. Times of the boat, ${record.system?.timeZone ?? 'UTC'}.`)}
        </Text>
        <Text style={styles.finding}>{verdict(record)}</Text>
        <Line name="Logger" value={record.serial} />
        <Line name="Fitted to" value={boat} />
        <Line name="Measures" value={record.logger?.channels.join(', ') ?? ''} />
        <Line name="Begun" value={`${at(record.startedAt)} by ${record.startedBy}`} />
        <Line name="Registered" value={at(record.fittedAt)} />
        <Line
          name="Signed off"
          value={
            record.finishedAt === null ? 'not yet' : `${at(record.finishedAt)} by ${record.finishedBy ?? ''}`
          }
        />
        {record.note === null ? null : <Line name="Note" value={record.note} />}
        {done.map((check, index) => (
          <Check key={index} check={check} unit={unit} at={at} />
        ))}
        <Text
          style={styles.foot}
          fixed
          render={({ pageNumber, totalPages }) =>
            `${record.serial}, ${boat}. Page ${pageNumber} of ${totalPages}. Middlewatch measures; it does not certify.`
          }
        />
      </Page>
    </Document>,
  )
}

const verdict = (record: Commissioning): string =>
  record.finishedAt === null
    ? 'Not signed off yet.'
    : record.passed
      ? 'Signed off: every check needed has passed or was left out with a reason.'
      : 'Signed off with exceptions: not every check has passed.'

function Line({ name, value }: { name: string; value: string }) {
  return (
    <View style={styles.line} wrap={false}>
      <Text style={styles.name}>{latin(name)}</Text>
      <Text style={styles.value}>{latin(value)}</Text>
    </View>
  )
}

function Check({
  check,
  unit,
  at,
}: {
  check: CommissioningCheck
  unit: VacuumUnit
  at: (instant: string | null) => string
}) {
  const outcome = check.outcome === null ? '' : OUTCOME_TITLES[check.outcome]
  return (
    <View style={styles.check} wrap={false}>
      <Text style={styles.heading}>
        {CHECK_TITLES[check.kind]}: {outcome.toLowerCase()}
      </Text>
      <Text style={styles.note}>{latin(`${at(check.doneAt)}, ${check.doneBy ?? ''}`)}</Text>
      <Text>{latin(check.reason)}</Text>
      {check.figures.map((figure) => (
        <Line key={figure.name} name={figure.name} value={figureWords(figure, unit)} />
      ))}
    </View>
  )
}
