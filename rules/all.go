// Package rules is the catalogue: one rule a file, its page of Markdown beside
// it, and the glossary of the terms that the pages use.
package rules

import "lagwise/lint"

// All returns the catalogue in its order: what makes a document unreadable
// first, then the data, the aim and the method.
func All() []lint.Rule {
	return []lint.Rule{
		// About the document.
		unreadableDocument,
		strayKey,
		wrongValue,
		absentField,
		unknownSeries,
		ambiguousSeries,
		repeatedName,
		missingManifest,
		unknownRule,
		circularConventions,
		missingConventions,
		reachedLimit,
		failedRule,

		// About the data.
		unreadableRecord,
		outsideRoot,
		unknownColumn,
		unparsedValues,
		stepMismatch,
		repeatedPositions,
		backwardAxis,
		constantSeries,
		missingUnit,
		suspectedMissingCode,
		censoredValues,
		idleSeries,

		mismatchedAxes,
		unevenSteps,
		droppedDifferences,

		// About the request.
		shortRecord,
		sharedDrift,
		oneSidedDrift,
		driftingRegression,
		stillDrifting,
		autocorrelatedLevels,
		autocorrelatedResiduals,
		leftoverAutocorrelation,
		leftoverSeason,
		overDifferencing,
		nearUnitRootErrors,
		unsuitedPearson,

		// About aim and method.
		unstatedAim,
		aimAndMethod,
		unacceptedMethod,

		// About deviations.
		endedDeviation,
		endingDeviation,
		incompleteDeviation,
		idleDeviation,
	}
}
