Rem Sends the table of the sheet "batch" in one request and writes the answer beside it. For LibreOffice Calc.
Rem Str and Val always use the point, so that an office with decimal commas sends and reads the same numbers.

Option Explicit

Const STATUS_ROW = 1    ' rows and columns count from 0
Const HEADER_ROW = 3
Const PATIENCE_ROWS = 100000

Sub SendRange()
  Dim sheet, table, answer As String, address As String, sent As Long, rows As Long
  sheet = ThisComponent.Sheets.getByName("batch")
  sent = CountAcross(sheet)
  rows = CountDown(sheet)
  If sent = 0 Or rows = 0 Then
    Tell(sheet, "there is no table under the headers in row " & (HEADER_ROW + 1))
    Exit Sub
  End If
  table = sheet.getCellRangeByPosition(0, HEADER_ROW, sent - 1, HEADER_ROW + rows).getDataArray()
  address = sheet.getCellByPosition(1, 0).getString() & "&errors=text"
  Tell(sheet, "asking ...")
  On Error GoTo NoAnswer
  answer = Post(address, TableText(table))
  On Error GoTo 0
  If Left(answer, 6) = "ERROR " Then
    Tell(sheet, answer)
    Exit Sub
  End If
  WriteBeside(sheet, answer, sent, rows)
  Exit Sub
NoAnswer:
  Tell(sheet, "no answer from " & address & ": " & Error())
End Sub

Sub Tell(sheet, text As String)
  sheet.getCellByPosition(1, STATUS_ROW).setString(text)
End Sub

Rem The table ends at the first empty header, and at the first row without a name.
Function CountAcross(sheet) As Long
  Dim column As Long
  Do While sheet.getCellByPosition(column, HEADER_ROW).getString() <> ""
    column = column + 1
  Loop
  CountAcross = column
End Function

Function CountDown(sheet) As Long
  Dim row As Long
  Do While row < PATIENCE_ROWS And sheet.getCellByPosition(0, HEADER_ROW + 1 + row).getString() <> ""
    row = row + 1
  Loop
  CountDown = row
End Function

Function TableText(table) As String
  Dim lines(UBound(table)) As String, cells() As String, row As Long, column As Long
  For row = 0 To UBound(table)
    ReDim cells(UBound(table(row))) As String
    For column = 0 To UBound(table(row))
      cells(column) = CellText(table(row)(column))
    Next
    lines(row) = Join(cells, ",")
  Next
  TableText = Join(lines, Chr(10)) & Chr(10)
End Function

Function CellText(value) As String
  If VarType(value) = 5 Then  ' a number
    CellText = Trim(Str(value))
  ElseIf InStr(value, ",") > 0 Or InStr(value, """") > 0 Or InStr(value, Chr(10)) > 0 Then
    CellText = """" & Replace(value, """", """""") & """"
  Else
    CellText = value
  End If
End Function

Rem The content broker of the office posts; what comes back is read from a pipe. A refusal has no text here, which is
Rem why the address ends with errors=text.
Function Post(address As String, text As String) As String
  Dim broker, content, source, sink, writer, reader
  Dim argument As New com.sun.star.ucb.PostCommandArgument2
  Dim command As New com.sun.star.ucb.Command
  source = CreateUnoService("com.sun.star.io.Pipe")
  writer = CreateUnoService("com.sun.star.io.TextOutputStream")
  writer.setOutputStream(source)
  writer.setEncoding("UTF-8")
  writer.writeString(text)
  writer.closeOutput()
  sink = CreateUnoService("com.sun.star.io.Pipe")
  argument.Source = source
  argument.Sink = sink
  argument.MediaType = "text/csv"
  command.Name = "post"
  command.Handle = -1
  command.Argument = argument
  broker = CreateUnoService("com.sun.star.ucb.UniversalContentBroker")
  content = broker.queryContent(broker.createContentIdentifier(address))
  content.execute(command, 0, Nothing)
  sink.closeOutput()
  reader = CreateUnoService("com.sun.star.io.TextInputStream")
  reader.setInputStream(sink)
  reader.setEncoding("UTF-8")
  Post = reader.readString(Array(), False)
End Function

Sub WriteBeside(sheet, answer As String, sent As Long, rows As Long)
  Dim lines() As String, header, cells, row As Long, column As Long, wide As Long, area
  lines = Split(answer, Chr(10))
  header = SplitLine(lines(0))
  wide = UBound(header) - sent + 1
  If UBound(lines) <> rows + 1 Or wide < 1 Then
    Tell(sheet, rows & " rows were sent, and " & (UBound(lines) - 1) & " came back: nothing is written")
    Exit Sub
  End If
  Dim table(rows), line()
  For row = 0 To rows
    cells = SplitLine(lines(row))
    ReDim line(wide - 1)
    For column = 0 To wide - 1
      line(column) = CellValue(cells(sent + column), header(sent + column), row = 0)
    Next
    table(row) = line
  Next
  area = sheet.getCellRangeByPosition(sent + 1, HEADER_ROW, sent + wide, HEADER_ROW + rows)
  area.setDataArray(table)
  Tell(sheet, rows & " rows answered")
End Sub

Rem An empty cell stays empty: Val would make it 0.
Function CellValue(text, title, isHeader As Boolean)
  If isHeader Or text = "" Or title = "quality_reason" Then
    CellValue = text
  Else
    CellValue = Val(text)
  End If
End Function

Rem The cells of a line of CSV; a comma within quotes is none, and a doubled quote stands for one.
Function SplitLine(line)
  Dim parts() As String, cells() As String, held As String, part, count As Long, isOpen As Boolean
  parts = Split(line, ",")
  ReDim cells(UBound(parts)) As String
  count = -1
  For Each part In parts
    If isOpen Then held = held & "," & part Else held = part
    isOpen = (Len(held) - Len(Replace(held, """", ""))) Mod 2 = 1
    If Not isOpen Then
      If Left(held, 1) = """" Then held = Replace(Mid(held, 2, Len(held) - 2), """""", """")
      count = count + 1
      cells(count) = held
    End If
  Next
  ReDim Preserve cells(count) As String
  SplitLine = cells
End Function
