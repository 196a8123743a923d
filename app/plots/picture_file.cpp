// SPDX-License-Identifier: GPL-3.0-or-later
#include "picture_file.h"

#include "whole_file.h"

#include <QBuffer>
#include <QCoreApplication>
#include <QFileInfo>
#include <QPageLayout>
#include <QPageSize>
#include <QPdfWriter>
#include <QSvgGenerator>

#include <qcustomplot.h>

#include <algorithm>

namespace rungwright
{

namespace
{

QString tr(const char* text) { return QCoreApplication::translate("Picture", text); }

/// Logical pixels an inch, as widgets and QImage count them, so that text keeps its size beside lines.
constexpr int kPixelsPerInch = 96;

bool draw(QPaintDevice& device, const Drawing& drawing)
{
    QCPPainter painter;
    if (!painter.begin(&device))
        return false;
    painter.setMode(QCPPainter::pmNoCaching);
    drawing(painter);
    return painter.end();
}

QByteArray png(const QSize& size, const Drawing& drawing)
{
    QByteArray bytes;
    QBuffer buffer(&bytes);
    buffer.open(QIODevice::WriteOnly);
    if (!pictureImage(size, 2.0, drawing).save(&buffer, "PNG"))
        bytes.clear();
    return bytes;
}

QByteArray svg(const QSize& size, const QString& title, const Drawing& drawing)
{
    QByteArray bytes;
    QBuffer buffer(&bytes);
    buffer.open(QIODevice::WriteOnly);
    QSvgGenerator generator;
    generator.setOutputDevice(&buffer);
    generator.setResolution(kPixelsPerInch);
    generator.setSize(size);
    generator.setViewBox(QRect(QPoint(0, 0), size));
    generator.setTitle(title);
    if (!draw(generator, drawing))
        bytes.clear();
    return bytes;
}

/// Equal drawings make equal files: the moment of writing, which QPdfWriter puts in unasked, is blanked out. The entry is optional
/// (ISO 32000-1, 14.3.3), and blanks keep every offset of the file.
void forgetMoment(QByteArray& pdf)
{
    const qsizetype begin = pdf.indexOf("/CreationDate (");
    const qsizetype end = begin < 0 ? -1 : pdf.indexOf(')', begin);
    if (end > begin)
        std::fill(pdf.begin() + begin, pdf.begin() + end + 1, ' ');
}

QByteArray pdf(const QSize& size, const QString& title, const Drawing& drawing)
{
    QByteArray bytes;
    QBuffer buffer(&bytes);
    buffer.open(QIODevice::WriteOnly);
    QPdfWriter writer(&buffer);
    writer.setCreator(QStringLiteral("Rungwright"));
    writer.setTitle(title);
    writer.setResolution(kPixelsPerInch);
    const QSizeF points = QSizeF(size) * 72.0 / kPixelsPerInch;
    writer.setPageLayout(QPageLayout(QPageSize(points, QPageSize::Point, QString(), QPageSize::ExactMatch), QPageLayout::Portrait,
                                     QMarginsF(), QPageLayout::Point));
    if (!draw(writer, drawing))
        bytes.clear();
    forgetMoment(bytes);
    return bytes;
}

} // namespace

QString pictureFilter()
{
    return tr("PNG picture (*.png)") + QStringLiteral(";;") + tr("SVG drawing (*.svg)") + QStringLiteral(";;") + tr("PDF page (*.pdf)");
}

QImage pictureImage(const QSize& size, double scale, const Drawing& drawing)
{
    QImage image((QSizeF(size) * scale).toSize(), QImage::Format_ARGB32_Premultiplied);
    if (image.isNull())
        return image;
    image.setDevicePixelRatio(scale);
    image.fill(Qt::transparent);
    draw(image, drawing);
    return image;
}

Outcome<bool> savePicture(const QString& path, const QSize& size, const QString& title, const Drawing& drawing)
{
    Q_ASSERT(!size.isEmpty());
    const QString ending = QFileInfo(path).suffix().toLower();
    QByteArray bytes;
    if (ending == QLatin1String("png"))
        bytes = png(size, drawing);
    else if (ending == QLatin1String("svg"))
        bytes = svg(size, title, drawing);
    else if (ending == QLatin1String("pdf"))
        bytes = pdf(size, title, drawing);
    else
        return Trouble{tr("%1: a picture's name ends in .png, .svg or .pdf.").arg(path).toStdString()};
    if (bytes.isEmpty())
        return Trouble{
            tr("%1: the picture could not be drawn at %2 by %3 pixels.").arg(path).arg(size.width()).arg(size.height()).toStdString()};
    return writeWhole(path, bytes);
}

} // namespace rungwright
