// SPDX-License-Identifier: GPL-3.0-or-later
#include "drawing/words.h"

#include "limits/place.h"
#include "limits/rounded.h"
#include "units/measure.h"
#include "units/text.h"

#include <cmath>

namespace headroom::drawing {

namespace {

const QChar thinSpace(0x2009), trueMinus(0x2212);

QString word(results::Mark mark) {
    switch (mark) {
    case results::Mark::held:
        return QStringLiteral("held");
    case results::Mark::tight:
        return QStringLiteral("tight");
    case results::Mark::undecided:
        return QStringLiteral("undecided");
    case results::Mark::broken:
        return QStringLiteral("broken");
    case results::Mark::notValid:
        return QStringLiteral("not valid");
    case results::Mark::notRun:
        return QStringLiteral("not run");
    case results::Mark::notApplicable:
        return QStringLiteral("not applicable");
    }
    return {};
}

QString withUnit(Quantity quantity, const std::string& number) {
    const QString symbol = text(info(quantity).symbol);
    return symbol.isEmpty() ? text(number) : text(number) + thinSpace + symbol;
}

QString extremeWords(const plant::Limit& limit, const results::Verdict& verdict) {
    return text(limits::extremeText(valueQuantity(limit), verdict.extreme, verdict.bound));
}

bool hasValue(const results::Verdict& verdict) {
    return verdict.mark != results::Mark::notRun && verdict.mark != results::Mark::notApplicable
           && std::isfinite(verdict.extreme) && std::isfinite(verdict.margin);
}

} // namespace

QString text(std::string_view utf8) {
    return QString::fromUtf8(utf8.data(), static_cast<qsizetype>(utf8.size()));
}

QString numberText(Quantity quantity, double si) {
    return text(print(quantity, si));
}

QString wholeAmount(Quantity quantity, double si) {
    QString digits = text(printNumber(quantity, si, {}, 0));
    const int first = digits.startsWith(trueMinus) ? 1 : 0;
    for (qsizetype at = digits.size() - 3; at > first; at -= 3) {
        digits.insert(at, thinSpace);
    }
    const QString symbol = text(info(quantity).symbol);
    return symbol.isEmpty() ? digits : digits + thinSpace + symbol;
}

QString amountOf(Quantity quantity, double si, double bound) {
    return text(printNumber(quantity, si)) + QStringLiteral(" of ") + numberText(quantity, bound);
}

QString percent(double share) {
    if (!std::isfinite(share)) {
        return QStringLiteral("–");
    }
    // A share that is not zero never reads as lying on the other side of the limit.
    const double rounded =
        share < 0.0 ? std::min(std::round(share * 100.0), -1.0) : std::floor(share * 100.0);
    const QString digits = QString::number(std::abs(rounded), 'f', 0);
    return rounded < 0.0 ? trueMinus + digits : digits;
}

Quantity valueQuantity(const plant::Limit& limit) {
    return info(limit.measure).quantity;
}

Quantity marginQuantity(const plant::Limit& limit) {
    const Quantity quantity = valueQuantity(limit);
    return quantity == Quantity::elevation ? Quantity::head : quantity;
}

QString signedMargin(Quantity quantity, double margin) {
    const QString size = withUnit(quantity, limits::marginNumber(quantity, margin));
    return margin < 0.0 ? trueMinus + size : size;
}

QString marginWords(const plant::Limit& limit, const results::Verdict& verdict) {
    // Rounded as everywhere: towards the limit, so that no verdict looks better than it is.
    const QString distance = withUnit(marginQuantity(limit),
                                      limits::marginNumber(marginQuantity(limit), verdict.margin));
    if (verdict.margin >= 0.0) {
        return verdict.margin > 0.0 ? distance + QStringLiteral(" inside")
                                    : QStringLiteral("at the limit");
    }
    return distance + (verdict.upper ? QStringLiteral(" above") : QStringLiteral(" below"));
}

QString extremeOfBound(const plant::Limit& limit, const results::Verdict& verdict) {
    const Quantity quantity = valueQuantity(limit);
    QString number = extremeWords(limit, verdict);
    const QString unit = thinSpace + text(info(quantity).symbol);
    if (number.endsWith(unit)) {
        number.chop(unit.size());
    }
    return number + QStringLiteral(" of ") + numberText(quantity, verdict.bound);
}

QString lozengeWords(const plant::Limit& limit, const results::Verdict& verdict) {
    return extremeWords(limit, verdict) + QStringLiteral(" at ") + timeWords(verdict.time_s)
           + QStringLiteral(", ") + marginWords(limit, verdict);
}

QString timeWords(double time_s) {
    // A whole second is enough once minutes have passed.
    return time_s >= 100.0 ? wholeAmount(Quantity::time, time_s)
                           : numberText(Quantity::time, time_s);
}

QString spokenVerdict(const QString& name, const plant::Limit& limit,
                      const results::Verdict& verdict) {
    QString out = name + QStringLiteral(": ") + word(verdict.mark);
    if (hasValue(verdict)) {
        out += QStringLiteral(", ") + extremeWords(limit, verdict) + QStringLiteral(" at ")
               + timeWords(verdict.time_s) + QStringLiteral(", limit ")
               + numberText(valueQuantity(limit), verdict.bound) + QStringLiteral(", ")
               + marginWords(limit, verdict);
        if (verdict.uncertainty > 0.0) {
            out +=
                QStringLiteral(", uncertain by ")
                + withUnit(marginQuantity(limit),
                           limits::uncertaintyNumber(marginQuantity(limit), verdict.uncertainty));
        }
    }
    out += QLatin1Char('.');
    if (verdict.reason) {
        out += QLatin1Char(' ') + text(whatText(*verdict.reason));
    }
    return out;
}

QString limitLetter(const plant::Project& project, const plant::Variant& variant, int limit) {
    if (limit < 0 || limit >= variant.limits.size()) {
        return {};
    }
    int position = project.limits.indexOf(variant.limits.name(limit));
    if (position < 0) {
        position = project.limits.size();
        for (int earlier = 0; earlier < limit; ++earlier) {
            position += project.limits.indexOf(variant.limits.name(earlier)) < 0 ? 1 : 0;
        }
    }
    QString letters;
    for (int rest = position; rest >= 0; rest = rest / 26 - 1) {
        letters.prepend(QChar('a' + rest % 26));
    }
    return letters;
}

QString classLetter(plant::LoadClass loadClass) {
    switch (loadClass) {
    case plant::LoadClass::normal:
        return QStringLiteral("N");
    case plant::LoadClass::exceptional:
        return QStringLiteral("X");
    case plant::LoadClass::extreme:
        return QStringLiteral("E");
    case plant::LoadClass::catastrophic:
        return QStringLiteral("C");
    }
    return {};
}

QString className(plant::LoadClass loadClass) {
    switch (loadClass) {
    case plant::LoadClass::normal:
        return QStringLiteral("normal");
    case plant::LoadClass::exceptional:
        return QStringLiteral("exceptional");
    case plant::LoadClass::extreme:
        return QStringLiteral("extreme");
    case plant::LoadClass::catastrophic:
        return QStringLiteral("catastrophic");
    }
    return {};
}

} // namespace headroom::drawing
