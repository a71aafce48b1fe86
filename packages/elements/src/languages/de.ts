import type { Messages } from '../shared/messages.js';
import { fit } from './de-fit.js';
import { forcingInput } from './de-forcing-input.js';
import { throughTime } from './de-through-time.js';

/** German. */
export const messages: Messages = {
  'amount.span': '{low} bis {high}',
  'amount.older': 'mehr als {age}',
  'amount.unassessed': 'Bereich nicht bestimmt',
  'amount.unknown': 'nicht bekannt',

  'table.page': 'Zeilen {from} bis {to} von {count}',
  'table.previous': 'Vorige Zeilen',
  'table.next': 'Nächste Zeilen',
  'table.thinned': 'Gedruckt: {shown} von {count} Zeilen.',
  'frame.chart': 'Diagramm',
  'frame.keys':
    'Die Pfeiltasten links und rechts gehen die Punkte entlang, auf und ab die Reihen; Pos1 und Ende gehen an die Enden; Esc legt den Zeiger weg.',
  'frame.table': 'Datentabelle',

  'reading.stream': 'Bachwassers',
  'reading.outflow': 'Wassers, das als {of} abfließt,',
  'reading.lead': {
    one: 'Etwa {count} von {of} Litern des {water} am {date} fiel innerhalb der letzten {period} als Regen ({range}).',
    other: 'Etwa {count} von {of} Litern des {water} am {date} fielen innerhalb der letzten {period} als Regen ({range}).',
  },
  'reading.leadBetween':
    'Zwischen {low} und {high} von {of} Litern des {water} am {date} fielen innerhalb der letzten {period} als Regen; für mehr ist die Aufzeichnung zu kurz.',
  'reading.leadFewer': 'Weniger als 1 von {of} Litern des {water} am {date} fiel innerhalb der letzten {period} als Regen ({range}).',
  'reading.leadMore': 'Mehr als {count} von {of} Litern des {water} am {date} fielen innerhalb der letzten {period} als Regen ({range}).',
  'reading.likely': 'wahrscheinlich zwischen {low} und {high} von {of}',
  'reading.half': 'Die Hälfte des Wassers ist älter als {age}.',
  'reading.halfAbout': 'Die Hälfte des Wassers ist älter als etwa {age} (Bereich nicht bestimmt).',
  'reading.halfBeyond':
    'Mehr als die Hälfte des Wassers ist älter als die Aufzeichnung, die im {month} begann; ihr Alter ist nicht bekannt.',
  'reading.beyond': {
    one: 'Etwa {count} von {of} Litern war schon im Boden, als die Aufzeichnung im {month} begann ({range}); sein Alter ist nicht bekannt.',
    other:
      'Etwa {count} von {of} Litern waren schon im Boden, als die Aufzeichnung im {month} begann ({range}); ihr Alter ist nicht bekannt.',
  },
  'reading.beyondFewer':
    'Weniger als 1 von {of} Litern war schon im Boden, als die Aufzeichnung im {month} begann ({range}); sein Alter ist nicht bekannt.',
  'reading.beyondMore':
    'Mehr als {count} von {of} Litern waren schon im Boden, als die Aufzeichnung im {month} begann ({range}); ihr Alter ist nicht bekannt.',
  'reading.assumed':
    'Etwa {count} von {of} Litern haben nur deshalb ein Alter, weil angenommen ist, dass das Wetter vor der Aufzeichnung dem Wetter in ihr glich.',
  'reading.withheld': 'Für den {date} wird kein Alter angegeben.',
  'reading.noOutflow': 'An diesem Tag floss kein Wasser ab.',
  'reading.recordTooShort': 'Die Aufzeichnung ist zu kurz, um etwas zu sagen.',
  'reading.storageRunsDown': 'Die Wasserbilanz der Aufzeichnung geht nicht auf: Es fließt mehr ab, als da gewesen sein kann.',
  'reading.preRecordDominates': 'Fast alles Wasser war schon da, als die Aufzeichnung begann.',
  'reading.samplesTooOld': 'Die letzte untersuchte Flasche ist zu alt, als dass die Aufzeichnung eine Aussage tragen könnte.',
  'reading.fitNotConverged': 'Die Proben haben sich auf keine Antwort geeinigt.',
  'reading.notAssessed': 'Es ist zu wenig bekannt, um es anzugeben.',
  'reading.invented': 'Eine erfundene Messstelle zur Vorführung: Diesen Ort gibt es nicht.',
  'reading.caution':
    'Eine Schätzung zur Information und Planung, keine Grundlage für Entscheidungen über Trinkwasser, Baden oder Notfälle. Zuständige Behörde, örtliche Regeln und zugelassene Fachleute gehen vor.',
  'reading.table': 'Die Zahlen hinter dem Satz',
  'reading.within': 'Innerhalb der letzten {age} als Regen gefallen',
  'reading.medianRow': 'Die Hälfte ist älter als',
  'reading.olderRow': 'Älter als die Aufzeichnung, Alter nicht bekannt',
  'reading.what': 'Vom Wasser',
  'reading.share': 'Anteil',
  'reading.range': 'Wahrscheinlicher Bereich',
  'reading.atLeast': 'mindestens {share}',
  'reading.date': 'Stand: {date}',
  'reading.dateEnd': 'Daten bis Ende des {date}',
  'reading.old': 'Alte Daten',
  'reading.kept': 'Aufbewahrte Kopie',
  'reading.trend':
    '{how}: {share} fielen innerhalb der letzten {age} als Regen, gegenüber {usual} in denselben Wochen von {years} früheren Jahren.',
  'reading.younger': 'Jünger als für die Jahreszeit üblich',
  'reading.older': 'Älter als für die Jahreszeit üblich',
  'reading.usual': 'Für die Jahreszeit üblich',
  'reading.confidence': 'Wie sicher',
  'reading.firm': 'Sicher: Die Proben stimmen überein und stützen die Antwort.',
  'reading.tentative': 'Vorläufig: Es gilt der Bereich, nicht die Mitte.',
  'reading.confidenceWithheld': 'Nicht sicher genug für eine Zahl.',
  'reading.confidenceNotAssessed':
    'Nicht bestimmt: ein einzelner Modelllauf, nicht an Proben geprüft; ein Bereich lässt sich nicht angeben.',
  'reading.evidence': 'Worauf es beruht',
  'reading.record': 'Aufzeichnung',
  'reading.samples': 'Proben',
  'reading.samplesLast': { one: '{count} Wasserprobe, vom {date}', other: '{count} Wasserproben, die letzte vom {date}' },
  'reading.samplesNone': 'keine verwendet',
  'reading.method': 'Verfahren',
  'reading.sources': 'Quellen',

  'plot.name': 'Wie alt das Wasser im Bach ist, {date}',
  'plot.nameOther': 'Wie alt das Wasser ist, das als {of} abfließt, {date}',
  'plot.nameStorage': 'Wie alt das Wasser im Boden ist, {date}',
  'plot.invented': 'Eine erfundene Messstelle zur Vorführung.',
  'plot.curve': 'Kurve',
  'plot.density': 'Nach Alter',
  'plot.drops': 'Tropfen',
  'plot.logAges': 'Gedehnte Alter',
  'plot.view': 'Darstellung',
  'plot.week': 'eine Woche',
  'plot.month': 'ein Monat',
  'plot.season': 'ein Vierteljahr',
  'plot.year': 'ein Jahr',
  'plot.tenYears': 'zehn Jahre',
  'plot.age': 'Alter des Wassers',
  'plot.younger': 'Anteil jünger',
  'plot.inClass': 'Anteil dieses Alters',
  'plot.range': 'Wahrscheinlicher Bereich',
  'plot.drop': 'Tropfen',
  'plot.beforeRecord': 'Älter als die Aufzeichnung: {share}',
  'plot.beforeRecordRange': 'Älter als die Aufzeichnung: {share} ({range})',
  'plot.summaryHalf': 'Die Hälfte des Wassers ist älter als {age}.',
  'plot.summaryHalfAbout': 'Die Hälfte des Wassers ist älter als etwa {age}; der Bereich ist nicht bestimmt.',
  'plot.summaryHalfBeyond': 'Mehr als die Hälfte des Wassers ist älter als die Aufzeichnung; ihr Alter ist nicht bekannt.',
  'plot.summaryBeyond':
    '{share} sind älter als die Aufzeichnung (Länge: {record}): Ihr Alter ist nicht bekannt, und für sie ist keine Kurve gezeichnet.',
  'plot.summaryAll': 'Alles Wasser kam während der Aufzeichnung (Länge: {record}).',
  'plot.readCurve': '{share} sind jünger als {age}; wahrscheinlicher Bereich {range}.',
  'plot.readCurveBare': '{share} sind jünger als {age}; Bereich nicht bestimmt.',
  'plot.readLow': 'Unteres Ende: {share} sind jünger als {age}.',
  'plot.readHigh': 'Oberes Ende: {share} sind jünger als {age}.',
  'plot.readDensity': '{share} sind zwischen {from} und {to} alt; äußerstenfalls {range}.',
  'plot.readDensityBare': '{share} sind zwischen {from} und {to} alt; Bereich nicht bestimmt.',
  'plot.readDrop': 'Tropfen {count} von {drops}: Alter {age}; wahrscheinlicher Bereich {range}.',
  'plot.readDropBare': 'Tropfen {count} von {drops}: Alter {age}; Bereich nicht bestimmt.',
  'plot.readDropBeyond': 'Tropfen {count} von {drops}: älter als die Aufzeichnung, Alter nicht bekannt.',
  'plot.aboutCurve':
    'Das Band ist der wahrscheinliche Bereich: der Anteil des Wassers, der jünger ist als das Alter darunter. Schraffiert: älter als die Aufzeichnung.',
  'plot.aboutCurveBare':
    'Die Linie ist der Anteil des Wassers, der jünger ist als das Alter darunter; ihr Bereich ist nicht bestimmt. Schraffiert: älter als die Aufzeichnung.',
  'plot.aboutDensity':
    'Jeder Balken ist der Anteil des Wassers in diesem Alter. Die Striche sind der weiteste Bereich, den das Band der Kurve zulässt. Schraffiert: älter als die Aufzeichnung.',
  'plot.aboutDensityBare':
    'Jeder Balken ist der Anteil des Wassers in diesem Alter; Bereiche sind nicht bestimmt. Schraffiert: älter als die Aufzeichnung.',
  'plot.aboutDrops':
    'Jeder Tropfen ist ein Liter von zwanzig, an seinem Alter; der Strich durch ihn ist sein wahrscheinlicher Bereich. Schraffiert: älter als die Aufzeichnung.',
  'plot.aboutDropsBare':
    'Jeder Tropfen ist ein Liter von zwanzig, an seinem Alter; Bereiche sind nicht bestimmt. Schraffiert: älter als die Aufzeichnung.',

  'station.loading': 'Die Daten der Messstelle werden geladen …',
  'station.stale': {
    one: 'Diese Daten sind alt: Sie enden am {date}, vor {count} Tag.',
    other: 'Diese Daten sind alt: Sie enden am {date}, vor {count} Tagen.',
  },
  'station.future': 'Diese Daten tragen das Datum {date}, das in der Zukunft liegt: Bitte die Uhr prüfen, hier oder an der Messstelle.',
  'station.offline': 'Keine Verbindung. Gezeigt wird die Kopie vom {date}.',
  'station.withheld': 'Zurzeit wird kein Alter angegeben.',
  'station.failed': 'Die Daten der Messstelle ließen sich nicht laden: {why}',
  'station.failedKept': 'Die neuesten Daten ließen sich nicht laden: {why} Gezeigt wird eine frühere Kopie.',
  'station.unreachable': 'Der Server ist nicht erreichbar.',
  'station.notFound': 'Unter dieser Adresse liegt keine Datei.',
  'station.refused': 'Der Server antwortete mit einem Fehler ({status}).',
  'station.html': 'Die Adresse liefert eine Webseite, keine Stationsdatei.',
  'station.empty': 'Die Antwort ist leer.',
  'station.tooLarge': 'Die Datei ist größer als {megabytes} MB.',
  'station.truncated': 'Die Datei ist unvollständig oder beschädigt.',
  'station.notStation': 'Die Datei ist keine Stationsdatei ({at}).',
  'station.newer': 'Die Datei ist von neuerer Fassung ({at}), als diese Seite versteht (1).',

  ...fit,
  ...throughTime,
  ...forcingInput,
};
